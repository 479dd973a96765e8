/** The figures of a case that are not known exactly, each with its range and what it moves in the circuit. */
import { emfOfCells } from '../../battery/emf.ts';
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
 * whatever field the job gives a `range` for that is a resistance, a length, a current or a power. Each string's resistance is a
 * figure of its own. The rest curve is one figure for all strings of a chemistry: which of the published curves fits is not known,
 * but strings that hang together rest on the same one; what tells them apart is their state of charge.
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
    ...parts.flatMap((part) => rangedFigures(part, request)),
  ].filter(({ low, high }) => high > low);
}

function stringFigures(string: StringPart, context: StringContext): readonly AssumedFigure[] {
  const { emfV, resistanceOhm } = stringSource(string, context);
  const figures = [
    oneMove(string, 'resistanceOhm', resistanceOhm, {
      label: `resistance of ${string.id}`,
      reading: 'two-load-resistance',
    }),
  ];
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
  readonly low: number;
  readonly value: number;
  readonly high: number;
  readonly origin: Origin;
}

function oneMove(
  part: Part,
  quantity: Shift['quantity'],
  { low, value, high, origin }: Ranged,
  { label, reading }: Pick<AssumedFigure, 'label' | 'reading'>,
): AssumedFigure {
  const moves = [{ shift: { part: part.id, quantity }, toLow: low - value, toHigh: high - value }];
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
