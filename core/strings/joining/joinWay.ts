/** What the current of a joint passes on its way, by the drawing. */
import { type CheckedJob, caseById } from '../../job/job.ts';
import type { PartId } from '../../job/part.ts';
import { operatingPoint } from '../../network/operatingPoint.ts';
import { isOpen, isWiring, type SinglePart, type WiringPart, withoutPairs } from '../../network/wiring.ts';
import type { Tables } from '../../tables/tables.ts';
import { nominalOf, type Piece, stringsOfPiece } from './joinPiece.ts';

export interface JoinWay {
  /** Part of the loop's current in each string, by the whole network with its leads. */
  readonly shares: ReadonlyMap<PartId, number>;
  /** Of the whole loop, strings included. */
  readonly loopOhm: number;
  /** Wiring that carries more than next to nothing of it, with its part of the current. */
  readonly passed: readonly { readonly part: WiringPart; readonly share: number }[];
  /** What was taken as closed, one sentence each. */
  readonly assumed: readonly string[];
}

export interface WayRequest {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly a: Piece;
  readonly b: Piece;
  /** First-instant resistance of each string, links included. */
  readonly ohmOf: (id: PartId) => number;
  readonly ambientDegC: number;
}

/** Small enough to leave every cable cold: the first instant warms nothing. */
const DRIVING_V = 0.01;
/** Less than this part of the loop's current is by the way. */
const LEAST_SHARE = 0.01;
/** Less than this many amperes from `DRIVING_V` is no loop. */
const LEAST_A = 1e-7;

/**
 * The two sides alone on the wiring of the job, everything else off, one with a small EMF and the other with none: the currents
 * say who carries what part, their sum the resistance. With what is open closed where they do not meet as drawn; `undefined`
 * where they do not meet even so.
 *
 * In a reciprocal network the part of the loop's current that a string carries is also the part of its EMF that stands in the
 * loop: sides of several strings are by these shares the Thévenin sources that they are.
 */
export function wayBetween(request: WayRequest): JoinWay | undefined {
  const wiring = withoutPairs(request.job.parts).filter(isWiring);
  const drawn = wayThrough(wiring, request);
  if (drawn !== undefined || !wiring.some(isOpen)) return drawn;
  const closed = wiring.map((part) => ('state' in part ? { ...part, state: 'closed' as const } : part));
  const way = wayThrough(closed, request);
  if (way === undefined) return undefined;
  const open = new Set(wiring.filter(isOpen).map(({ id }) => id));
  const taken = way.passed.filter(({ part }) => open.has(part.id));
  return {
    ...way,
    assumed: taken.map(({ part }) => `state: the ${part.kind} "${part.id}" taken as closed by the joint`),
  };
}

function wayThrough(wiring: readonly WiringPart[], request: WayRequest): JoinWay | undefined {
  const { job, tables, a, b, ohmOf } = request;
  const rest = caseById(job, 'at-rest');
  if (rest === undefined) return undefined;
  const strings: SinglePart[] = [];
  const put = (piece: Piece, emfV: number): void => {
    if (piece.kind !== 'string') {
      const whole = nominalOf(piece);
      for (const one of piece.pieces) put(one, piece.kind === 'parallel' ? emfV : (emfV * nominalOf(one)) / whole);
      return;
    }
    const { string } = piece;
    strings.push({ ...string, emfV, resistanceOhm: ohmOf(string.id), linkOhm: 0, midpoint: undefined });
  };
  put(a, DRIVING_V);
  put(b, 0);
  const operatingCase = { ...rest, changed: new Map(), ambientDegC: request.ambientDegC };
  const alone: CheckedJob = { ...job, parts: [...wiring, ...strings] };
  const { outcome, parts } = operatingPoint({ job: alone, tables, operatingCase, model: 'fast' });
  if (outcome !== 'solved') return undefined;
  const currentOf = (id: PartId) => parts.get(id)?.currentA ?? 0;
  const loopA = currentOfPiece(a, currentOf);
  if (loopA < LEAST_A) return undefined;
  // Each side by its own current, which is the loop's but for rounding: a string alone has it all.
  const sharesOf = (piece: Piece): readonly (readonly [PartId, number])[] => {
    const wholeA = currentOfPiece(piece, currentOf);
    return stringsOfPiece(piece).map(({ id }) => [id, currentOf(id) / wholeA]);
  };
  return {
    shares: new Map([...sharesOf(a), ...sharesOf(b)]),
    loopOhm: DRIVING_V / loopA,
    passed: wiring
      .map((part) => ({ part, share: Math.abs(currentOf(part.id)) / loopA }))
      .filter(({ share }) => share > LEAST_SHARE),
    assumed: [],
  };
}

function currentOfPiece(piece: Piece, currentOf: (id: PartId) => number): number {
  if (piece.kind === 'string') return currentOf(piece.string.id);
  const each = piece.pieces.map((one) => currentOfPiece(one, currentOf));
  return piece.kind === 'series' ? each[0]! : each.reduce((sum, one) => sum + one, 0);
}
