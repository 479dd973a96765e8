/** What the person has entered about two sides that are to be joined, and the question that it makes. */
import {
  type AtRest,
  type Bank,
  type CheckedJob,
  type Chemistry,
  type JoinSideAsk,
  joinPairs,
  type PartId,
} from '../../../core/api.ts';
import type { JoiningQuestion } from '../../workers/stringsMessages.ts';
import { type Tags, tagList, tagOf } from './tags.ts';

/** A figure as it was typed, and what it means. */
export interface Entry {
  readonly store: number | string | undefined;
  readonly value: number | undefined;
}
export const NO_ENTRY: Entry = { store: undefined, value: undefined };

export type JoinBy = 'volts' | 'charge' | 'as-drawn';

export interface BlockForm {
  readonly chemistry: Chemistry;
  readonly blocksInSeries: number;
  readonly blockNominalV: Entry;
  readonly capacityAh: Entry;
}

export interface SideForm {
  /** Key of one of the `sides`, or `block`. */
  readonly which: string;
  readonly block: BlockForm;
  readonly volts: Entry;
  readonly charge: Entry;
}

export interface JoinForm {
  readonly by: JoinBy;
  readonly a: SideForm;
  readonly b: SideForm;
  readonly lead: Entry;
  readonly limit: Entry;
}

export interface SideChoice {
  readonly key: string;
  readonly words: string;
  readonly strings: readonly PartId[];
}

/** A block that is in no bank yet. */
export const BLOCK = 'block';

/** All that can be one side of a joint: branches one by one, banks as a whole. */
export function sideChoices(banks: readonly Bank[], tags: Tags): readonly SideChoice[] {
  const branches = banks
    .flatMap((bank) => bank.branches)
    .map(({ strings }): SideChoice => {
      const ids = strings.map(({ id }) => id);
      const words =
        ids.length === 1 ? `string ${tagOf(tags, ids[0] ?? '')}` : `strings ${tagList(tags, ids)} in series`;
      return { key: ids.join(' '), words, strings: ids };
    });
  const whole = banks
    .filter((bank) => bank.branches.length > 1)
    .map(({ strings }): SideChoice => {
      const ids = strings.map(({ id }) => id);
      return { key: `bank ${ids.join(' ')}`, words: `bank of ${tagList(tags, ids)}`, strings: ids };
    });
  return [...branches, ...whole];
}

/** The two between which most flows at rest, else the pair that the engine thinks of first, else the string beside a loose block. */
export function firstForm(job: CheckedJob, { pairs }: AtRest, choices: readonly SideChoice[]): JoinForm {
  const [most] = pairs.toSorted((a, b) => b.currentA - a.currentA);
  const branchWith = (id: PartId) => choices.find(({ strings }) => strings.includes(id))?.strings;
  const [pair] = most === undefined ? joinPairs(job) : [[branchWith(most.from), branchWith(most.to)] as const];
  const string = job.parts.find((part) => part.kind === 'string');
  const block: BlockForm = {
    chemistry: string?.chemistry ?? 'agm',
    blocksInSeries: string?.blocksInSeries ?? 1,
    blockNominalV: entryOf(string?.blockNominalV ?? 12),
    capacityAh: entryOf(string?.capacityAh ?? 100),
  };
  const side = (ids: readonly PartId[] | undefined): SideForm => ({
    which: choices.find(({ strings }) => strings.join(' ') === ids?.join(' '))?.key ?? BLOCK,
    block,
    volts: NO_ENTRY,
    charge: NO_ENTRY,
  });
  const a = pair?.[0] ?? choices[0]?.strings;
  const [first, second] = [side(a), side(pair?.[1])];
  const isLoose = first.which === BLOCK || second.which === BLOCK;
  return { by: isLoose ? 'volts' : 'as-drawn', a: first, b: second, lead: NO_ENTRY, limit: NO_ENTRY };
}

function entryOf(value: number): Entry {
  return { store: value, value };
}

/** Null where a figure that is asked for is missing. */
export function questionOf(
  { by, a, b, lead, limit }: JoinForm,
  choices: readonly SideChoice[],
): JoiningQuestion | null {
  const first = sideAsk(a, by, choices);
  const second = sideAsk(b, by, choices);
  if (first === null || second === null) return null;
  return {
    a: first,
    b: second,
    ...(lead.value === undefined ? {} : { leadOhm: lead.value }),
    ...(limit.value === undefined ? {} : { limitA: limit.value }),
  };
}

function sideAsk(
  { which, block, volts, charge }: SideForm,
  by: JoinBy,
  choices: readonly SideChoice[],
): JoinSideAsk | null {
  if (by === 'volts' && volts.value === undefined) return null;
  if (by === 'charge' && charge.value === undefined) return null;
  const read = by === 'volts' ? { volts: volts.value } : by === 'charge' ? { charge: charge.value } : {};
  if (which !== BLOCK) {
    const strings = choices.find(({ key }) => key === which)?.strings;
    return strings === undefined ? null : { strings, ...read };
  }
  const { chemistry, blocksInSeries, blockNominalV, capacityAh } = block;
  if (blockNominalV.value === undefined || capacityAh.value === undefined || by === 'as-drawn') return null;
  return {
    block: { chemistry, blocksInSeries, blockNominalV: blockNominalV.value, capacityAh: capacityAh.value },
    ...read,
  };
}
