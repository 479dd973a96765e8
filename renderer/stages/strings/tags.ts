/** How a string is told from the others without colour: a short tag, a hatch and a dash, the same in every picture. */
import type { Bank, CheckedJob, PartId } from '../../../core/api.ts';
import type { HatchNumber } from '../../charts/Hatches.tsx';

export interface StringTag {
  readonly id: PartId;
  /** One to three letters or digits. */
  readonly tag: string;
  /** `String C`, or its label where it has one. */
  readonly name: string;
  readonly hatch: HatchNumber;
}
export type Tags = ReadonlyMap<string, StringTag>;

/** Ids this short are tags themselves; somewhat longer where there is room for them. */
const LONGEST_TAG = 3;
const LONGEST_OF_FEW = 5;
const FEW = 3;
const HATCHES = 8;

export function tagsOf(job: CheckedJob, banks: readonly Bank[]): Tags {
  const strings = banks.flatMap((bank) => bank.strings);
  const areShort = strings.every(({ id }) => id.length <= (strings.length <= FEW ? LONGEST_OF_FEW : LONGEST_TAG));
  const endings = endingsOf(strings.map(({ id }) => id));
  return new Map(
    strings.map(({ id }, index) => {
      const label = job.parts.find((part) => part.id === id)?.label;
      const tag = areShort ? id : (endings?.[index] ?? letter(index));
      return [id, { id, tag, name: label ?? `String ${id}`, hatch: (index % HATCHES) as HatchNumber }];
    }),
  );
}

/** `B3` for `BANK-3` and `B` for `house B`, where these tell the strings apart; null where they do not. */
function endingsOf(ids: readonly string[]): readonly string[] | null {
  const endings = ids.flatMap((id) => {
    const ending = /(?:[A-Z]?\d{1,2}|[A-Z])$/.exec(id)?.[0] ?? [];
    // A bare number would run into the figures beside it.
    return typeof ending === 'string' && /^\d/.test(ending) ? `${id.charAt(0).toUpperCase()}${ending}` : ending;
  });
  return endings.length === ids.length && new Set(endings).size === ids.length ? endings : null;
}

/** A … Z, then A2 … */
function letter(index: number): string {
  const round = Math.floor(index / 26);
  return `${String.fromCharCode(65 + (index % 26))}${round === 0 ? '' : String(round + 1)}`;
}

export function tagOf(tags: Tags, id: string): string {
  return tags.get(id)?.tag ?? id;
}

/** `A`, `A and B`, `A, B and C`. */
export function tagList(tags: Tags, ids: readonly string[]): string {
  const words = ids.map((id) => tagOf(tags, id));
  return words.length < 2 ? (words[0] ?? '') : `${words.slice(0, -1).join(', ')} and ${words.at(-1) ?? ''}`;
}
