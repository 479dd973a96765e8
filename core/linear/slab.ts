/**
 * Small arrays, cut from larger pieces of memory. Asking the system for each of them would cost more than the analysis of a small network.
 * A piece lives as long as any array cut from it.
 */

/**
 * Bytes in a piece. Each one that is asked for may make the garbage collector take a step, so they are not small; but one small array that
 * is kept keeps its piece, so they are not large either.
 */
const PIECE = 524_288;
/** Arrays above this share of a piece get memory of their own, so that little is wasted at a piece's end. */
const LARGE = PIECE / 8;

const current = { piece: new ArrayBuffer(0), used: 0 };

/** An array of integers; what stands in it is zero. */
export function newInts(length: number): Int32Array {
  if (4 * length > LARGE) return new Int32Array(length);
  const at = cut(4 * length); // first: it may begin a new piece
  return new Int32Array(current.piece, at, length);
}

/** An array of numbers; what stands in it is zero. */
export function newNumbers(length: number): Float64Array {
  if (8 * length > LARGE) return new Float64Array(length);
  const at = cut(8 * length);
  return new Float64Array(current.piece, at, length);
}

/** The place of so many bytes in the current piece, which may be a new one. */
function cut(bytes: number): number {
  const rounded = (bytes + 7) & ~7;
  if (current.used + rounded > current.piece.byteLength) {
    current.piece = new ArrayBuffer(PIECE);
    current.used = 0;
  }
  const at = current.used;
  current.used += rounded;
  return at;
}
