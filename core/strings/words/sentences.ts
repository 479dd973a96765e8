/** What a study comes to in plain sentences, the answer first: what must be stopped, then what flows, then what would change it. */

import type { StringsStudy } from '../study.ts';
import {
  bandSentences,
  driftSentences,
  joinSentences,
  layoutSentences,
  leadSentences,
  lossSentences,
  readingSentences,
  seriesSentences,
} from './changeSentences.ts';
import { restSentences } from './restSentences.ts';
import type { StudySentence } from './sentence.ts';
import { shareSentences } from './shareSentences.ts';

/** `nameOf` names an operating case at the head of a sentence; `Case evening` where nothing better is at hand. */
export function studySentences(
  study: StringsStudy,
  nameOf: (caseId: string) => string = (caseId) => `Case ${caseId}`,
): readonly StudySentence[] {
  const told = [
    ...restSentences(study),
    ...shareSentences(study, nameOf),
    ...lossSentences(study, nameOf),
    ...layoutSentences(study),
    ...leadSentences(study),
    ...joinSentences(study),
    ...seriesSentences(study),
    ...bandSentences(study),
    ...readingSentences(study),
    ...driftSentences(study),
  ];
  return [...told.filter(({ urgent }) => urgent), ...told.filter(({ urgent }) => !urgent)];
}
