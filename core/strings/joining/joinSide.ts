/** One side of a joint: as a person asks for it, and what is made of it. */
import { factsOf, stringSource } from '../../battery/stringSource.ts';
import type { CheckedJob } from '../../job/job.ts';
import type { Chemistry, JunctionId, PartId, StringPart } from '../../job/part.ts';
import { closedNets, netsOf, withoutPairs } from '../../network/wiring.ts';
import type { ChemistryTables } from '../../tables/chemistryTables.ts';
import { formatQuantity } from '../../units/formatQuantity.ts';
import { nominalOf, type Piece, pieceOf, stringsOfPiece } from './joinPiece.ts';
import { chargesAllowed, restCurve } from './restCurve.ts';
import { firstAt } from './straightLine.ts';

/** A block or row of blocks that is not in the job: on the bench, about to be bought. */
export interface JoinBlock {
  readonly chemistry: Chemistry;
  readonly blocksInSeries: number;
  readonly blockNominalV: number;
  readonly capacityAh: number;
  readonly temperatureDegC?: number | undefined;
  readonly ageYears?: number | undefined;
}

/** Strings of the job (one, one branch, or a bank seen as one) or a block of its own; with a reading, a charge, or as they stand. */
export interface JoinSideAsk {
  readonly strings?: readonly PartId[] | undefined;
  readonly block?: JoinBlock | undefined;
  /** Volts of the whole side, read at rest; the state of charge is found back from the curve unless `charge` is given too. */
  readonly volts?: number | undefined;
  /** State of charge, 0 to 1. */
  readonly charge?: number | undefined;
}

export interface JoinSide {
  readonly name: string;
  /** Its strings as asked for: state of charge and rest voltage set. */
  readonly piece: Piece;
  /** The strings as they stand in the job; none for a block of its own. */
  readonly drawn: readonly PartId[];
  readonly assumed: readonly string[];
}

export interface SideContext {
  readonly job: CheckedJob;
  readonly tables: ChemistryTables;
  readonly ambientDegC: number;
}

/** `place` names a block that has no name of its own: `block 1`. */
export function sideOf(ask: JoinSideAsk, place: 1 | 2, context: SideContext): JoinSide | { readonly missing: string } {
  const fault = figureFault(ask);
  if (fault !== undefined) return { missing: `${fault} of side ${place}` };
  const found = pieceAsked(ask, place, context.job);
  if ('missing' in found) return found;
  const assumed: string[] = [];
  const piece = asAsked(found.piece, ask, context, assumed);
  for (const string of stringsOfPiece(piece)) {
    assumed.push(...stringSource(string, { ...context, model: 'slow' }).assumed);
  }
  return { ...found, piece, assumed };
}

function figureFault({ volts, charge }: JoinSideAsk): string | undefined {
  if (volts !== undefined && !(volts > 0 && Number.isFinite(volts))) return 'volts above 0';
  return charge === undefined || (charge >= 0 && charge <= 1) ? undefined : 'state of charge between 0 and 1';
}

type Found = Pick<JoinSide, 'name' | 'piece' | 'drawn'>;

function pieceAsked(ask: JoinSideAsk, place: 1 | 2, job: CheckedJob): Found | { readonly missing: string } {
  if (ask.block !== undefined) {
    const name = `block ${place}`;
    const { blocksInSeries, blockNominalV, capacityAh } = ask.block;
    if (!(blocksInSeries >= 1 && blockNominalV > 0 && capacityAh > 0)) {
      return { missing: `blocks, volts and ampere-hours above 0 of side ${place}` };
    }
    return { name, piece: { kind: 'string', string: blockAsString(ask.block, name) }, drawn: [] };
  }
  const drawn = [...new Set(ask.strings ?? [])];
  if (drawn.length === 0) return { missing: `a string or a block for side ${place}` };
  const parts = withoutPairs(job.parts);
  const strings: StringPart[] = [];
  for (const id of drawn) {
    const string = parts.find((part) => part.id === id);
    if (string?.kind !== 'string') return { missing: `a string called "${id}" in the job` };
    strings.push(string);
  }
  const piece =
    pieceOf(strings, closedNets(parts)) ??
    pieceOf(
      strings,
      netsOf(parts, ({ kind }) => kind !== 'diode'),
    );
  const name = drawn.join('+');
  return piece === undefined
    ? { missing: `strings that act as one: ${name} stand neither in series nor side by side` }
    : { name, piece, drawn };
}

function blockAsString(block: JoinBlock, name: string): StringPart {
  return {
    id: name as PartId,
    kind: 'string',
    label: undefined,
    note: undefined,
    locationTag: undefined,
    at: undefined,
    origin: new Map(),
    range: new Map(),
    given: new Set(Object.keys(block)),
    plus: `${name} plus` as JunctionId,
    minus: `${name} minus` as JunctionId,
    stateOfCharge: 1,
    emfV: undefined,
    resistanceOhm: undefined,
    linkOhm: 0,
    linkSize: undefined,
    maxChargeA: undefined,
    maxDischargeA: undefined,
    shortCircuitA: undefined,
    midpoint: undefined,
    ...block,
    temperatureDegC: block.temperatureDegC,
    ageYears: block.ageYears,
  };
}

interface Asked {
  readonly volts?: number | undefined;
  readonly charge?: number | undefined;
}

/** A reading of the whole is the reading of each one side by side, and is shared out in series as the strings' own volts are. */
function asAsked(piece: Piece, { volts, charge }: Asked, context: SideContext, assumed: string[]): Piece {
  if (piece.kind === 'string') {
    return { kind: 'string', string: stringAsAsked(piece.string, { volts, charge }, context, assumed) };
  }
  const own = piece.pieces.map((one) => nominalOf(one));
  const whole = own.reduce((sum, one) => sum + one, 0);
  const pieces = piece.pieces.map((one, index) => {
    const part = volts === undefined || piece.kind === 'parallel' ? volts : (volts * own[index]!) / whole;
    return asAsked(one, { volts: part, charge }, context, assumed);
  });
  return { kind: piece.kind, pieces };
}

function stringAsAsked(string: StringPart, asked: Asked, context: SideContext, assumed: string[]): StringPart {
  const { charge } = asked;
  const asDrawn = asked.volts === undefined && charge === undefined;
  const emfV = asDrawn ? string.emfV : asked.volts;
  if (asDrawn && (emfV === undefined || string.given.has('stateOfCharge'))) return string;
  const given = new Set([...string.given, 'stateOfCharge']);
  if (charge !== undefined) return { ...string, stateOfCharge: charge, emfV, given };
  const facts = factsOf(string, context);
  const curve = restCurve(facts, context.tables);
  const stateOfCharge = firstAt(curve, emfV!);
  const beyondV = emfV! < curve[0]!.y ? emfV! - curve[0]!.y : Math.max(0, emfV! - curve.at(-1)!.y);
  const allowed = chargesAllowed(facts, emfV!, context.tables);
  assumed.push(
    beyondV === 0 ? readBackText(string.id, emfV!, stateOfCharge, allowed) : beyondText(string, emfV!, beyondV),
  );
  return { ...string, stateOfCharge, emfV, given };
}

function readBackText(id: PartId, emfV: number, charge: number, [low, high]: readonly [number, number]): string {
  return `stateOfCharge: that of "${id}" read back from ${voltText(emfV)} at rest: ${percent(charge)}, between ${percent(low)} and ${percent(high)}`;
}

function beyondText({ id, chemistry }: StringPart, emfV: number, beyondV: number): string {
  const apart = `${voltText(Math.abs(beyondV))} ${beyondV < 0 ? 'below that of an empty one' : 'above that of a full one'}`;
  const why = beyondV < 0 ? 'a cell may be dead or shorted' : 'it may not have rested since its last charge';
  return `emfV: "${id}" at ${voltText(emfV)} lies ${apart} by the ${chemistry} curve, which is moved to it (${why}); taken as ${beyondV < 0 ? 'empty' : 'full'}`;
}

function voltText(value: number): string {
  return formatQuantity({ value, unit: 'V', digits: 4 });
}

function percent(charge: number): string {
  return `${Math.round(100 * charge)} %`;
}
