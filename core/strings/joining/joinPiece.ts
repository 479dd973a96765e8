/** Strings that act as one: in series, side by side, or both. */
import type { PartId, StringPart } from '../../job/part.ts';
import type { Nets } from '../../network/wiring.ts';

export type Piece =
  | { readonly kind: 'string'; readonly string: StringPart }
  | { readonly kind: 'series' | 'parallel'; readonly pieces: readonly Piece[] };

interface PoledPiece {
  readonly piece: Piece;
  readonly minus: number;
  readonly plus: number;
}

/** One piece of all these strings as the nets join them; `undefined` where they do not come down to one. */
export function pieceOf(strings: readonly StringPart[], nets: Nets): Piece | undefined {
  let pieces: readonly PoledPiece[] = strings.map((string) => ({
    piece: { kind: 'string', string },
    minus: nets.of(string.minus) ?? -1,
    plus: nets.of(string.plus) ?? -1,
  }));
  while (pieces.length > 1) {
    const fewer = besideMerged(pieces) ?? inRowMerged(pieces);
    if (fewer === undefined) return undefined;
    pieces = fewer;
  }
  return pieces[0]?.piece;
}

export function stringsOfPiece(piece: Piece): readonly StringPart[] {
  return piece.kind === 'string' ? [piece.string] : piece.pieces.flatMap(stringsOfPiece);
}

/** Label volts of a piece. */
export function nominalOf(piece: Piece): number {
  if (piece.kind === 'string') return piece.string.blocksInSeries * piece.string.blockNominalV;
  const each = piece.pieces.map(nominalOf);
  return piece.kind === 'parallel' ? Math.max(...each) : each.reduce((sum, one) => sum + one, 0);
}

/** Of strings in series the least; side by side the sum. */
export function capacityOf(piece: Piece): number {
  if (piece.kind === 'string') return piece.string.capacityAh;
  const each = piece.pieces.map(capacityOf);
  return piece.kind === 'series' ? Math.min(...each) : each.reduce((sum, one) => sum + one, 0);
}

/** The part of a piece's whole that falls to each string, where side by side it is split as `weigh` says. */
export function splitOver(
  piece: Piece,
  weigh: (piece: Piece) => number,
  whole = 1,
  into = new Map<PartId, number>(),
): ReadonlyMap<PartId, number> {
  if (piece.kind === 'string') return into.set(piece.string.id, whole);
  const weights = piece.pieces.map(weigh);
  const total = weights.reduce((sum, one) => sum + one, 0);
  piece.pieces.forEach((one, index) => {
    splitOver(one, weigh, piece.kind === 'series' ? whole : (whole * weights[index]!) / total, into);
  });
  return into;
}

function besideMerged(pieces: readonly PoledPiece[]): readonly PoledPiece[] | undefined {
  for (const { minus, plus } of pieces) {
    const beside = pieces.filter((one) => one.minus === minus && one.plus === plus);
    if (beside.length < 2) continue;
    const merged: PoledPiece = { piece: together('parallel', beside), minus, plus };
    return [...pieces.filter((one) => !beside.includes(one)), merged];
  }
  return undefined;
}

/** Two that meet where none of the others does. */
function inRowMerged(pieces: readonly PoledPiece[]): readonly PoledPiece[] | undefined {
  for (const lower of pieces) {
    const meeting = pieces.filter(({ minus, plus }) => minus === lower.plus || plus === lower.plus);
    const upper = meeting.find(({ minus }) => minus === lower.plus);
    if (meeting.length !== 2 || upper === undefined || upper === lower) continue;
    const merged: PoledPiece = { piece: together('series', [lower, upper]), minus: lower.minus, plus: upper.plus };
    return [...pieces.filter((one) => one !== lower && one !== upper), merged];
  }
  return undefined;
}

/** A series of series is one series. */
function together(kind: 'series' | 'parallel', pieces: readonly PoledPiece[]): Piece {
  return { kind, pieces: pieces.flatMap(({ piece }) => (piece.kind === kind ? piece.pieces : [piece])) };
}
