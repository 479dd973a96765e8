/** When two findings of two reports are the same one. */
import type { Finding } from '../checks/finding.ts';

/** Rules that judge a part together with another; the rest judge their first part, and name others beside it. */
const JUDGES_TWO: ReadonlySet<string> = new Set(['charger-volts-off', 'cold-charge']);
/** `one-out-overload` goes by the first string of its bank: a string more in it is to be its remedy, not another bank. */
const JUDGES_ALL: ReadonlySet<string> = new Set([
  'group-unconnected',
  'share-uneven',
  'circulating-at-rest',
  'joining-surge',
  'too-many-strings',
  'parallel-mix',
  'series-mismatch',
  'midpoint-off',
  'charge-and-load-share-links',
]);

/**
 * Same rule about the same judged parts, whatever case or neighbour is worst: a fuse that is too large for another cable after
 * a change is still too large.
 */
export function identityOf({ rule, parts }: Pick<Finding, 'rule' | 'parts'>): string {
  const judged = JUDGES_ALL.has(rule) ? parts : parts.slice(0, JUDGES_TWO.has(rule) ? 2 : 1);
  return JSON.stringify([rule, ...judged]);
}
