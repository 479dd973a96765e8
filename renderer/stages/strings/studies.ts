/** The studies of the stage Strings. Quick ones have a worker of their own, so that a long one does not hold them up. */
import { Studies as StudiesAt, type Study, useStudyOf } from '../../state/studies.ts';
import type { Studies, StudyName } from '../../workers/stringsMessages.ts';
import { StudyDesk } from '../../workers/studyDesk.ts';
import type { AnswersOf, AsksOf } from '../../workers/studyMessages.ts';

const begin = (): Worker => new Worker(new URL('../../workers/strings.worker.ts', import.meta.url), { type: 'module' });

const QUICK: ReadonlySet<string> = new Set(['now', 'oneOut', 'joining']);
const quick = new StudyDesk(begin, false);
const long = new StudyDesk(begin, true);

const studies = new StudiesAt<Studies>((name) => (QUICK.has(name) ? quick : long));

export function useStudy<Name extends StudyName>(
  name: Name,
  asks: AsksOf<Studies, Name> | null,
  wanted: boolean,
): Study<AnswersOf<Studies, Name>> {
  return useStudyOf(studies, { name, asks, wanted });
}
