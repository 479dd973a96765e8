/** The figures of a case that are not known exactly, each with its range and what it moves in the circuit. */
import { emfOfCells } from '../../battery/emf.ts';
import { ownScatter } from '../../battery/resistance.ts';
import { factsOf, type StringContext, stringSource } from '../../battery/stringSource.ts';
import type { CheckedJob, OperatingCase } from '../../job/job.ts';
import { partsInCase } from '../../job/job.ts';
import type { CablePart, Origin, Part, PartId, StringPart } from '../../job/part.ts';
import { cablesOfPair, originOf } from '../../job/part.ts';
import type { BatteryModel } from '../../network/answer.ts';
import { ambientOf } from '../../network/circuit.ts';
import { conductorModel } from '../../network/conductorModel.ts';
import type { Shift } from '../../network/shift.ts';
import type { Tables } from '../../tables/tables.ts';

/** How far one quantity of the circuit moves: `to` its low and its high, from where it is. */
export interface Move {
  readonly shift: Shift;
  readonly toLow: number;
  readonly toHigh: number;
  /** Where given, moves of the same quantity multiply as factors on this figure instead of adding up. */
  readonly base?: number;
}

export interface AssumedFigure {
  readonly label: string;
  /** The part it belongs to; the first where it is one figure of several. */
  readonly part: PartId;
  readonly quantity: Shift['quantity'];
  readonly origin: Origin;
  readonly low: number;
  readonly value: number;
  readonly high: number;
  readonly moves: readonly Move[];
  /** The reading that would replace it, where a person can take one. */
  readonly reading: 'rest-volts' | 'two-load-resistance' | null;
}

export interface FiguresRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly operatingCase: OperatingCase;
  readonly model: BatteryModel;
}

/**
 * Every figure with a range: EMF and resistance of strings (entered ones by where they come from, defaults by their tables), and
 * whatever field the job gives a `range` for that is a resistance, a length, a current or a power.
 *
 * What is not known about a make is the same for all strings of it, and is drawn once for them: which of the published rest curves fits
 * their chemistry, and which resistance their label stands for. What tells such strings apart is drawn for each: its state of charge,
 * how it has aged, and the scatter of a lot (`ownScatter`).
 */
export function assumedFigures(request: FiguresRequest): readonly AssumedFigure[] {
  const parts = partsInCase(request.job, request.operatingCase);
  const strings = parts.filter((part) => part.kind === 'string');
  const context = {
    model: request.model,
    ambientDegC: ambientOf(request.job, request.operatingCase),
    tables: request.tables.chemistry,
  };
  return [
    ...strings.flatMap((string) => stringFigures(string, context)),
    ...curveFigures(strings, context),
    ...makeFigures(strings, context),
    ...parts.flatMap((part) => rangedFigures(part, request)),
  ].filter(({ low, high }) => high > low);
}

function stringFigures(string: StringPart, context: StringContext): readonly AssumedFigure[] {
  const { emfV, resistanceOhm } = stringSource(string, context);
  const words = { label: `resistance of ${string.id}`, reading: 'two-load-resistance' } as const;
  const figures = [oneMove(string, 'resistanceOhm', ownResistance(string, context) ?? resistanceOhm, words)];
  if (string.emfV !== undefined) {
    figures.push(oneMove(string, 'emfV', emfV, { label: `rest volts of ${string.id}`, reading: 'rest-volts' }));
  } else figures.push(...chargeFigure(string, context));
  const links = string.range.get('linkOhm');
  if (links !== undefined && string.linkOhm > 0) {
    const banded = { low: links[0], value: string.linkOhm, high: links[1], origin: originOf(string, 'linkOhm') };
    figures.push(oneMove(string, 'resistanceOhm', banded, { label: `links of ${string.id}`, reading: null }));
  }
  return figures;
}

/** A resistance from the tables, as far as a string may differ from others with its label; nothing where the job gives the figure. */
function ownResistance(string: StringPart, context: StringContext): (Ranged & { readonly base: number }) | undefined {
  const { value, low, high, origin } = stringSource(string, context).resistanceOhm;
  if (origin !== 'default') return undefined;
  const own = ownScatter(string, context.tables);
  return { low: Math.max(low, value * own.low), value, high: Math.min(high, value * own.high), origin, base: value };
}

/** One figure for all strings with the same label: which resistance it stands for. */
function makeFigures(strings: readonly StringPart[], context: StringContext): readonly AssumedFigure[] {
  const byLabel = new Map<string, StringPart[]>();
  for (const string of strings) {
    if (ownResistance(string, context) === undefined) continue;
    const { chemistry, blocksInSeries, blockNominalV, capacityAh } = string;
    const label = [chemistry, blocksInSeries, blockNominalV, capacityAh].join(' ');
    byLabel.set(label, [...(byLabel.get(label) ?? []), string]);
  }
  return [...byLabel.values()].map((group) => {
    const moves = group.map((string): Move => {
      const { value, low, high } = stringSource(string, context).resistanceOhm;
      const own = ownResistance(string, context)!;
      const toLow = (value * low) / own.low - value;
      const toHigh = (value * high) / own.high - value;
      return { shift: { part: string.id, quantity: 'resistanceOhm' }, toLow, toHigh, base: value };
    });
    const { value } = stringSource(group[0]!, context).resistanceOhm;
    return {
      label: `resistance of ${group[0]!.chemistry} strings of ${String(group[0]!.capacityAh)} Ah (${group.map(({ id }) => id).join(', ')})`,
      part: group[0]!.id,
      quantity: 'resistanceOhm',
      origin: 'default',
      low: value + moves[0]!.toLow,
      value,
      high: value + moves[0]!.toHigh,
      moves,
      reading: null,
    };
  });
}

/** What the range of its state of charge makes of a string's rest volts, on one curve. */
function chargeFigure(string: StringPart, context: StringContext): readonly AssumedFigure[] {
  const range = string.range.get('stateOfCharge');
  if (range === undefined) return [];
  const [low, value, high] = [range[0], string.stateOfCharge, range[1]].map((charge) => restV(string, charge, context));
  const banded = { low: low!.value, value: value!.value, high: high!.value, origin: originOf(string, 'stateOfCharge') };
  return [oneMove(string, 'emfV', banded, { label: `state of charge of ${string.id}`, reading: 'rest-volts' })];
}

function restV(string: StringPart, stateOfCharge: number, context: StringContext) {
  const { cells, temperatureDegC } = factsOf(string, context);
  return emfOfCells(cells, { chemistry: string.chemistry, stateOfCharge, temperatureDegC }, context.tables);
}

/** One figure a chemistry: where between its lowest and its highest the curve lies. */
function curveFigures(strings: readonly StringPart[], context: StringContext): readonly AssumedFigure[] {
  const byChemistry = new Map<string, StringPart[]>();
  for (const string of strings) {
    if (string.emfV !== undefined) continue;
    byChemistry.set(string.chemistry, [...(byChemistry.get(string.chemistry) ?? []), string]);
  }
  return [...byChemistry].map(([chemistry, group]) => {
    const first = restV(group[0]!, group[0]!.stateOfCharge, context);
    return {
      label: `rest curve of ${chemistry} (${group.map(({ id }) => id).join(', ')})`,
      part: group[0]!.id,
      quantity: 'emfV',
      origin: 'default',
      low: first.low,
      value: first.value,
      high: first.high,
      reading: null,
      moves: group.map((string) => {
        const { low, value, high } = restV(string, string.stateOfCharge, context);
        return { shift: { part: string.id, quantity: 'emfV' }, toLow: low - value, toHigh: high - value };
      }),
    };
  });
}

interface Ranged {
  /** See `Move.base`. */
  readonly base?: number;
  readonly low: number;
  readonly value: number;
  readonly high: number;
  readonly origin: Origin;
}

function oneMove(
  part: Part,
  quantity: Shift['quantity'],
  { low, value, high, origin, base }: Ranged,
  { label, reading }: Pick<AssumedFigure, 'label' | 'reading'>,
): AssumedFigure {
  const move = { shift: { part: part.id, quantity }, toLow: low - value, toHigh: high - value };
  const moves = [base === undefined ? move : { ...move, base }];
  return { label, part: part.id, quantity, origin, low, value, high, moves, reading };
}

/** Fields of parts that are no strings, where the job says between what they lie. */
function rangedFigures(part: Part, request: FiguresRequest): readonly AssumedFigure[] {
  switch (part.kind) {
    case 'joint':
    case 'fuse':
    case 'breaker':
    case 'switch':
      return plain(part, 'resistanceOhm', 'resistanceOhm', part.resistanceOhm);
    case 'busbar':
      return plain(part, 'segmentOhm', 'resistanceOhm', part.segmentOhm);
    case 'load':
      return [
        ...plain(part, 'powerW', 'powerW', part.powerW),
        ...plain(part, 'currentA', 'currentA', part.currentA),
        ...plain(part, 'resistanceOhm', 'resistanceOhm', part.resistanceOhm),
      ];
    case 'cable':
      return cableFigures(part, [part], request);
    case 'pair':
      return cableFigures(part, cablesOfPair(part), request);
    default:
      return [];
  }
}

function plain(
  part: Part,
  field: string,
  quantity: Shift['quantity'],
  value: number | undefined,
): readonly AssumedFigure[] {
  const range = part.range.get(field);
  // A figure of nothing is no small figure: a zero-ohm part has no place in the matrix, a load of no watts no current.
  if (range === undefined || value === undefined || value === 0) return [];
  const banded = { low: range[0], value, high: range[1], origin: originOf(part, field) };
  return [oneMove(part, quantity, banded, { label: `${field} of ${part.id}`, reading: null })];
}

/** Ranges of a cable's terminations, length or measured resistance; an out-and-back run moves both its cables. */
function cableFigures(
  part: Part,
  cables: readonly CablePart[],
  { job, operatingCase, tables }: FiguresRequest,
): readonly AssumedFigure[] {
  const ambientDegC = ambientOf(job, operatingCase);
  const context = { practice: job.practice, ambientDegC, tables, detail: `${job.practice} ${ambientDegC}` };
  return ['endOhm', 'lengthM', 'resistanceOhm'].flatMap((field) => {
    const range = part.range.get(field);
    const value = (cables[0] as unknown as Readonly<Record<string, number | undefined>>)[field];
    if (range === undefined || value === undefined || value === 0) return [];
    const moves = cables.map((cable): Move => {
      const perUnit = ohmPerUnit(cable, field, conductorModel(cable, context).coldOhm);
      const shift = { part: cable.id, quantity: 'resistanceOhm' } as const;
      return { shift, toLow: perUnit * (range[0] - value), toHigh: perUnit * (range[1] - value) };
    });
    return [
      {
        label: `${field} of ${part.id}`,
        part: part.id,
        quantity: 'resistanceOhm' as const,
        origin: originOf(part, field),
        low: range[0],
        value,
        high: range[1],
        moves,
        reading: null,
      },
    ];
  });
}

/** d(cold resistance)/d(field). */
function ohmPerUnit(cable: CablePart, field: string, coldOhm: number): number {
  const endOhm = cable.endOhm / cable.inParallel;
  if (field === 'endOhm') return 1 / cable.inParallel;
  return field === 'lengthM' ? (coldOhm - endOhm) / cable.lengthM : 1;
}
