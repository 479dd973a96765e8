/**
 * Arrays for factorisations: cut from larger pieces of memory, and given back when a factorisation is released. Asking the system for each of
 * them, and for fresh pages, would cost more than the analysis of a small network.
 */

/** Bytes in a piece. It lives as long as any array cut from it. */
const PIECE = 65_536;
/** Arrays above this share of a piece get memory of their own, so that little is wasted at a piece's end. */
const LARGE = PIECE / 8;
/** Arrays of one length that are kept for the next who asks. */
const KEPT = 4;

const current = { piece: new ArrayBuffer(0), used: 0 };
const freeInts = new Map<number, Int32Array[]>();
const freeNumbers = new Map<number, Float64Array[]>();

/** An array of at least this length, with anything in it. */
export function takeInts(length: number): Int32Array {
  const rounded = roundUp(length);
  const known = freeInts.get(rounded);
  if (known !== undefined && known.length > 0) return known.pop()!;
  if (4 * rounded > LARGE) return new Int32Array(rounded);
  const at = cut(4 * rounded); // first: it may begin a new piece
  return new Int32Array(current.piece, at, rounded);
}

/** An array of at least this length, with anything in it. */
export function takeNumbers(length: number): Float64Array {
  const rounded = roundUp(length);
  const known = freeNumbers.get(rounded);
  if (known !== undefined && known.length > 0) return known.pop()!;
  if (8 * rounded > LARGE) return new Float64Array(rounded);
  const at = cut(8 * rounded);
  return new Float64Array(current.piece, at, rounded);
}

/** Gives back an array that came from here; nobody may use it any more. */
export function giveBackInts(array: Int32Array): void {
  keep(freeInts, array);
}

/** Gives back an array that came from here; nobody may use it any more. */
export function giveBackNumbers(array: Float64Array): void {
  keep(freeNumbers, array);
}

function keep<T extends Int32Array | Float64Array>(free: Map<number, T[]>, array: T): void {
  const known = free.get(array.length);
  if (known === undefined) free.set(array.length, [array]);
  else if (known.length < KEPT) known.push(array);
}

/** Up to the next multiple of a quarter of the power of two below: few different lengths, at most a quarter too long. */
function roundUp(length: number): number {
  const step = 1 << Math.max(0, 29 - Math.clz32(length));
  return (length + step - 1) & -step;
}

/** The place of so many bytes in the current piece, which may be a new one. */
function cut(bytes: number): number {
  const rounded = (bytes + 7) & -8;
  if (current.used + rounded > current.piece.byteLength) {
    current.piece = new ArrayBuffer(PIECE);
    current.used = 0;
  }
  const at = current.used;
  current.used += rounded;
  return at;
}
