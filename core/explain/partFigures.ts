/** Every figure of a part as the answer used it, with where it comes from: what the ledger lists. */
import { stringSource } from '../battery/stringSource.ts';
import type { Rule } from '../job/field.ts';
import { partsInCase } from '../job/job.ts';
import type { Origin, Part, PartId, PartKind } from '../job/part.ts';
import { originOf } from '../job/part.ts';
import { partFields } from '../job/partFields.ts';
import type { Assumption } from '../network/answer.ts';
import { ambientOf } from '../network/circuit.ts';
import { withoutPairs } from '../network/wiring.ts';
import type { Basis } from '../tables/status.ts';
import { sizeText } from '../units/conductorSize.ts';
import type { PartRequest } from './workingLine.ts';

/** One figure of a part as the answer used it. */
export interface PartFigure {
  /** Field of the part as the job file names it, or what the solve names an assumption by. */
  readonly field: string;
  /** Value used; null where the job gives none and nothing needed one. */
  readonly value: number | string | boolean | null;
  /** A unit as `formatQuantity` knows it; empty for words. */
  readonly unit: string;
  /** `given` by the job; `standard`, the job file's own default; `assumed` by the solve; `not-given` and not needed. */
  readonly from: 'given' | 'standard' | 'assumed' | 'not-given';
  readonly origin: Origin;
  /** Low and high, in the field's own unit. */
  readonly range: readonly [number, number] | null;
  readonly basis: Basis | null;
  /** The case changes this figure. */
  readonly changedInCase: boolean;
  /** What the solve says of an assumption, one sentence. */
  readonly text?: string;
}

type Assumed = Pick<PartFigure, 'value' | 'range' | 'basis'> & { readonly origin?: Origin; readonly text?: string };

const COMMON_PRACTICE: Basis = {
  source: 'SRC-PRACTICE',
  text: 'common practice, no source',
  status: 'common-practice',
};

/** Figures that count as nothing where the job gives none. */
const NOTHING_UNLESS_GIVEN: Partial<Record<PartKind, readonly string[]>> = {
  fuse: ['resistanceOhm'],
  breaker: ['resistanceOhm'],
  switch: ['resistanceOhm'],
  diode: ['slopeOhm'],
  inverter: ['acPowerW', 'standbyW'],
  converter: ['standbyW'],
};

/**
 * The figures of a part in the order of the job file's fields: value used, unit, origin, range, basis; those that the job does not
 * give and the solve took for granted among them, and after them what the solve assumed that is no field of the part. Junctions
 * are left out. An out-and-back run answers with what its two cables assumed. Empty for an id that is no part.
 */
export function partFigures(request: PartRequest): readonly PartFigure[] {
  const { job, operatingCase, point } = request;
  const part = partAsked(request);
  if (part === undefined) return [];
  const drawn = partById(job.parts, part.id);
  const ids = part.kind === 'pair' ? [`${part.id}.plus`, `${part.id}.minus`] : [part.id];
  const assumptions = once(point.assumptions.filter((one) => one.part !== null && ids.includes(one.part)));
  const assumed = assumedBy(part, assumptions, request);
  const isChanged = (field: string) =>
    operatingCase.changed.has(part.id) &&
    drawn !== undefined &&
    figureOfField(drawn, field) !== figureOfField(part, field);
  const fields = Object.entries(partFields.get(part.kind) ?? {}).filter(([, { rule }]) => isFigure(rule));
  const listed = fields.map(([field, { rule }]) =>
    figureOf(part, { field, rule, assumed, changedInCase: isChanged(field) }),
  );
  const known = new Set([...fields.map(([field]) => field), ...assumed.keys()]);
  const others = assumptions.filter((one) => !known.has(fieldOf(part, one)));
  return [...listed, ...others.map(loose)];
}

/** The part as it stands in the case; a cable of an out-and-back run by its own id. */
export function partAsked({
  job,
  operatingCase,
  part,
}: Pick<PartRequest, 'job' | 'operatingCase' | 'part'>): Part | undefined {
  return partById(partsInCase(job, operatingCase), part);
}

function partById(parts: readonly Part[], id: PartId): Part | undefined {
  return parts.find((part) => part.id === id) ?? withoutPairs(parts).find((part) => part.id === id);
}

function isFigure({ holds }: Rule): boolean {
  return !['junction', 'poles', 'junction-list', 'point', 'anything'].includes(holds);
}

function figureOf(
  part: Part,
  at: {
    readonly field: string;
    readonly rule: Rule;
    readonly assumed: ReadonlyMap<string, Assumed>;
    readonly changedInCase: boolean;
  },
): PartFigure {
  const { field, rule, assumed, changedInCase } = at;
  const unit = 'unit' in rule ? rule.unit : '';
  const own = figureOfField(part, field);
  const note = assumed.get(field);
  const base = { field, unit, changedInCase, range: part.range.get(field) ?? note?.range ?? null };
  if (own !== undefined) {
    const isGiven = part.given.has(field);
    const from = isGiven ? 'given' : 'standard';
    const said = isGiven || note?.text === undefined ? {} : { text: note.text };
    return { ...base, value: own, from, origin: originOf(part, field), basis: note?.basis ?? null, ...said };
  }
  if (note === undefined) return { ...base, value: null, from: 'not-given', origin: 'default', basis: null };
  const said = note.text === undefined ? {} : { text: note.text };
  return { ...base, value: note.value, from: 'assumed', origin: note.origin ?? 'default', basis: note.basis, ...said };
}

/** A field's value as one figure or one word. */
function figureOfField(part: Part, field: string): number | string | boolean | undefined {
  const value = (part as unknown as Readonly<Record<string, unknown>>)[field];
  if (value === undefined || typeof value === 'number' || typeof value === 'string' || typeof value === 'boolean') {
    return value;
  }
  if (Array.isArray(value)) return value.map((point) => String(point).replace(',', ': ')).join(', ');
  return sizeText(value as Parameters<typeof sizeText>[0]);
}

/** What the solve took for fields that the job does not give, by field. */
function assumedBy(part: Part, assumptions: readonly Assumption[], request: PartRequest): ReadonlyMap<string, Assumed> {
  const found = new Map<string, Assumed>();
  for (const field of NOTHING_UNLESS_GIVEN[part.kind] ?? []) {
    found.set(field, {
      value: 0,
      range: null,
      basis: COMMON_PRACTICE,
      text: `${field} of ${part.id} taken as nothing`,
    });
  }
  for (const [field, assumed] of surroundings(part, request)) found.set(field, assumed);
  for (const one of assumptions) {
    const field = fieldOf(part, one);
    const { range, basis, origin, text } = one;
    found.set(field, { value: figureIn(one, found.get(field)?.value), range, basis, origin, text });
  }
  return found;
}

/** Temperatures and bands that follow from the case, the site and the tables. */
function surroundings(
  part: Part,
  { job, operatingCase, point, tables }: PartRequest,
): readonly (readonly [string, Assumed])[] {
  const ambientDegC = ambientOf(job, operatingCase);
  const of =
    operatingCase.ambientDegC !== undefined
      ? `case ${operatingCase.id}`
      : job.site.ambientDesignDegC !== undefined
        ? 'the site'
        : 'common practice';
  const air: Assumed = { value: ambientDegC, range: null, basis: null, text: `the air of ${of}` };
  if (part.kind === 'string') {
    const context = { model: point.model, ambientDegC, tables: tables.chemistry };
    const { emfV, resistanceOhm } = stringSource(part, context);
    const banded = ({ value, low, high, basis, origin }: typeof emfV): Assumed => {
      return { value, range: [low, high], basis, origin };
    };
    return [
      ['temperatureDegC', air],
      ['emfV', banded(emfV)],
      ['resistanceOhm', banded(resistanceOhm)],
    ];
  }
  if (part.kind !== 'cable' && part.kind !== 'pair') return [];
  const insulation = tables.conductors.defaultInsulationDegC[job.practice];
  const found: (readonly [string, Assumed])[] = [
    ['ambientDegC', air],
    ['insulationDegC', { value: insulation.value, range: null, basis: insulation.basis }],
  ];
  const conductorDegC = point.parts.get(part.id)?.conductorDegC;
  if (conductorDegC === undefined) return found;
  const text = 'found from its own current and the air around it';
  return [...found, ['conductorDegC', { value: conductorDegC, range: null, basis: null, text }]];
}

/** The field that an assumption settles: its own, or the one that its sentence begins with. */
function fieldOf(part: Part, { field, text }: Assumption): string {
  if (partFields.get(part.kind)?.[field] !== undefined) return field;
  const [first] = /^\w+/.exec(text) ?? [];
  return first !== undefined && partFields.get(part.kind)?.[first] !== undefined ? first : field;
}

/** The figure or word in an assumption that is told as a sentence (`metal copper`, `vocPerDegC: -0.003 taken …`). */
function figureIn({ value, text }: Assumption, known: PartFigure['value'] | undefined): PartFigure['value'] {
  if (typeof value === 'number') return value;
  const [, word] = /^\w+ (\S+)$/.exec(text) ?? [];
  if (word !== undefined) return word;
  const [, taken] = /^\w+: (-?[\d.]+(?:e-?\d+)?) taken\b/.exec(text) ?? [];
  return taken === undefined ? (known ?? null) : Number(taken);
}

/** An assumption that is no field of the part. */
function loose({ field, value, unit, range, origin, basis, text }: Assumption): PartFigure {
  return { field, value, unit, from: 'assumed', origin, range, basis, changedInCase: false, text };
}

/** The two cables of a run assume the same things: each is told once. */
function once(assumptions: readonly Assumption[]): readonly Assumption[] {
  const seen = new Set<string>();
  return assumptions.filter(({ field, text }) => {
    const key = `${field} ${text}`;
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
}
