/** Figures put in where a part needs one and none is known: each marked as a guess, so that the job can be read and solved. */

import { parseQuantity } from '../units/parseQuantity.ts';
import type { UnitName } from '../units/unitName.ts';
import type { Draft, OpenDraft, OpenPart, RawPart } from './draft.ts';

/** Nominal volts taken where a job says nothing about them. */
const usualSystemV = 12;

/** A figure of the file in its own unit, be it a number or a text with a unit; `undefined` where it is neither. */
export function figureOf(value: unknown, unit: UnitName): number | undefined {
  if (typeof value === 'number') return value;
  if (typeof value !== 'string') return undefined;
  const read = parseQuantity({ text: value, unit });
  return read.ok ? read.value : undefined;
}

/** Nominal volts of a draft: its settings, its first string, its targets, else 12 V. */
export function systemVOf(draft: Draft | OpenDraft): number {
  const open = draft as OpenDraft;
  const settings = open['settings'] as Record<string, unknown> | undefined;
  const targets = open['targets'] as Record<string, unknown> | undefined;
  const first = open.parts.find(({ kind }) => kind === 'string');
  const blockV = figureOf(first?.['blockNominalV'], 'V');
  const blocks = figureOf(first?.['blocksInSeries'], '1');
  const bankV = blockV === undefined || blocks === undefined ? undefined : blockV * blocks;
  return figureOf(settings?.['nominalV'], 'V') ?? bankV ?? figureOf(targets?.['systemV'], 'V') ?? usualSystemV;
}

type Given = Readonly<Record<string, unknown>>;

/**
 * Required fields of each kind with a usual figure of small systems. Common practice, no source: they are there to be replaced.
 * `systems` is how many times 12 V the system is.
 */
function guessesFor(kind: string, given: Given, { systemV, practice }: Surroundings): Given {
  const systems = Math.max(1, Math.round(systemV / 12));
  const american = practice === 'us-land' || practice === 'us-marine';
  switch (kind) {
    case 'string': {
      const lithium = given['chemistry'] === 'lfp';
      const blockV = figureOf(given['blockNominalV'], 'V') ?? (lithium ? 12.8 : 12);
      const blocks = Math.max(1, Math.round((systems * 12) / blockV));
      return { chemistry: 'agm', blocksInSeries: blocks, blockNominalV: blockV, capacityAh: 100 };
    }
    case 'cable':
      return { lengthM: 1, ...sized(given, american) };
    case 'pair':
      return { lengthM: 2, ...sized(given, american) };
    case 'fuse':
    case 'breaker':
      return { ratingA: 40 };
    case 'shunt':
      return { ratingA: 100, ratingMv: 50 };
    case 'joint':
      return { resistanceOhm: 0.0001 };
    case 'load':
      return ['powerW', 'currentA', 'resistanceOhm'].some((field) => given[field] !== undefined) ? {} : { powerW: 50 };
    case 'inverter':
      return { ratedW: 500 * systems };
    case 'array':
      // One module of 36 cells for each 12 V.
      return { modulesInSeries: systems, stringsInParallel: 1, vocV: 22, iscA: 6, vmpV: 18, impA: 5.6 };
    case 'controller':
      return { type: 'mppt', outputA: 20, maxInputV: systems > 2 ? 150 : 100, setpointV: 14.4 * systems };
    case 'charger':
      return { outputA: 20, setpointV: 14.4 * systems };
    case 'converter':
      return { outputV: 12, outputA: 20 };
    default:
      return {};
  }
}

function sized(given: Given, american: boolean): Given {
  return given['resistanceOhm'] === undefined ? { size: american ? '6 AWG' : '16 mm2' } : {};
}

export interface Surroundings {
  readonly systemV: number;
  readonly practice: unknown;
}

export function surroundingsOf(draft: Draft | OpenDraft): Surroundings {
  return { systemV: systemVOf(draft), practice: draft['practice'] };
}

/** Fills in the required figures that an open part lacks, each with its origin `guess`. */
export function fillGuesses(part: OpenPart, around: Surroundings): void {
  const guesses = guessesFor(part.kind, part, around);
  for (const field of Object.keys(guesses)) {
    if (part[field] !== undefined) continue;
    part[field] = typeof guesses[field] === 'number' ? Number(guesses[field].toPrecision(6)) : guesses[field];
    part['origin'] = { ...(part['origin'] as Given | undefined), [field]: 'guess' };
  }
}

/** The figure that would be guessed for a field of this part; `undefined` where the field is not required. */
export function guessFor(part: RawPart, field: string, around: Surroundings): unknown {
  const others = Object.fromEntries(Object.entries(part).filter(([name]) => name !== field));
  return guessesFor(part.kind, others, around)[field];
}
