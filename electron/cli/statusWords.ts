/** How far a figure may be trusted, in words. */
import type { Status } from '../../core/api.ts';

export const statusWords: Readonly<Record<Status, string>> = {
  published: 'published',
  'common-practice': 'common practice, no source',
  'from-memory': 'from memory, confirm against the text',
};
