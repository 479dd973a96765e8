/** The studies behind Protection and the two rule books. What is quick has a worker of its own. */
import { Studies, type Study, useStudyOf } from '../../state/studies.ts';
import type { ProtectionStudies } from '../../workers/protectionMessages.ts';
import { StudyDesk } from '../../workers/studyDesk.ts';
import type { AnswersOf, AsksOf, StudyNameOf } from '../../workers/studyMessages.ts';

type Name = StudyNameOf<ProtectionStudies>;

const begin = (): Worker =>
  new Worker(new URL('../../workers/protection.worker.ts', import.meta.url), { type: 'module' });

const quick = new StudyDesk(begin, false);
const long = new StudyDesk(begin, true);
const studies = new Studies<ProtectionStudies>((name) => (name === 'proposals' || name === 'ticked' ? long : quick));

export function useProtectionStudy<N extends Name>(
  name: N,
  asks: AsksOf<ProtectionStudies, N> | null,
  wanted = asks !== null,
): Study<AnswersOf<ProtectionStudies, N>> {
  return useStudyOf(studies, { name, asks, wanted });
}
