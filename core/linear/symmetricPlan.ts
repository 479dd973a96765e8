/** The plan of an L D Lᵀ factorisation: what is eliminated when and which numbers it meets, worked out once from the pattern alone. */
import type { Pattern } from './matrix.ts';
import { type ColumnPlan, planColumns } from './planColumns.ts';
import { reduceLinks } from './reduceLinks.ts';
import { takeInts } from './slab.ts';
import { stripLeaves } from './stripLeaves.ts';
import { reserve, workspace } from './workspace.ts';

/**
 * The numbers stand in one array w (see `SymmetricFactors`): the diagonal d, length size + 1; the right-hand side y, length size + 1; then
 * the off-diagonal entries: one a leaf, two a link, the sparse columns, and the full block's upper triangle without diagonal, row by row.
 * d and y are indexed by node; node `size` is nobody.
 *
 * `table` is the program of the elimination, a list of integers in this order:
 * - leaves: (node, neighbour)
 * - links: (node, neighbour, neighbour or nobody, place in w of the entry between the two)
 * - sparse columns: (node, d, d rows, d (d - 1) / 2 places in w, d), the places in w for row pairs (0, 1), (0, 2) … (1, 2) …
 * - the nodes of the full block
 * - for each entry of the pattern its place in w.
 */
export interface SymmetricPlan {
  readonly pattern: Pattern;
  readonly leafCount: number;
  readonly linkCount: number;
  readonly columnCount: number;
  readonly fullSize: number;
  readonly table: Int32Array;
  /** Integers of the table that are used. */
  readonly tableLength: number;
  /** Where the full block's nodes begin in the table. */
  readonly fullNodes: number;
  /** Where the places of the pattern's entries begin in the table. */
  readonly slots: number;
  /** Where the full block begins in w. */
  readonly fullPlace: number;
  /** Length of w. */
  readonly storage: number;
}

/** Where the arrays of an analysis begin in the workspace; all by node unless said otherwise. */
export interface Layout {
  /** Neighbours left; -1 once eliminated. */
  readonly degree: number;
  /** Exclusive-or of the neighbours left; of the entries that lead there. */
  readonly neighbour: number;
  readonly edge: number;
  /** 1 while the diagonal is empty. */
  readonly held: number;
  /** Nodes to look at; length size + 1. */
  readonly queue: number;
  /** 1 for a node in the queue. */
  readonly waiting: number;
  /** The last pass in which a neighbour was eliminated. */
  readonly pass: number;
  /** Neighbour lists: where they begin, and how far they are filled. */
  readonly start: number;
  readonly cursor: number;
  /** By entry, then by fill of the links: its place in w. */
  readonly slot: number;
  /** The program so far: at most four integers a node. */
  readonly program: number;
  /** By end of a branch, two an entry: the node there, the place of the other end, the number of the entry. */
  readonly end: number;
  readonly twin: number;
  readonly entry: number;
  /** The first free place after all that. */
  readonly free: number;
  /** Where the off-diagonal entries begin in w. */
  readonly offDiagonal: number;
}

function layOut({ size, rowIndices }: Pattern): Layout {
  const ends = 2 * (rowIndices.length - size);
  const slot = 9 * size + 1;
  const program = slot + rowIndices.length + size;
  const end = program + 4 * size;
  return {
    degree: 0,
    neighbour: size,
    edge: 2 * size,
    held: 3 * size,
    waiting: 4 * size,
    pass: 5 * size,
    start: 6 * size,
    cursor: 7 * size,
    queue: 8 * size,
    slot,
    program,
    end,
    twin: end + ends,
    entry: end + 2 * ends,
    free: end + 3 * ends,
    offDiagonal: 2 * (size + 1),
  };
}

/** Works out the plan. */
export function symmetricPlan(pattern: Pattern): SymmetricPlan {
  const { size } = pattern;
  const at = layOut(pattern);
  reserve(at.free);
  const leafCount = stripLeaves(pattern, at);
  const linkCount = reduceLinks(pattern, at, leafCount);
  const core = planColumns(at, {
    patternSize: size,
    size: size - leafCount - linkCount,
    place: at.offDiagonal + leafCount + 2 * linkCount,
  });
  placeLinkEntries(at, leafCount, linkCount);
  const chainEnd = 2 * leafCount + 4 * linkCount;
  const slots = chainEnd + core.end - core.start;
  return {
    pattern,
    leafCount,
    linkCount,
    columnCount: core.columnCount,
    fullSize: core.fullSize,
    table: collect(pattern, at, core, chainEnd),
    tableLength: slots + pattern.rowIndices.length,
    fullNodes: slots - core.fullSize,
    slots,
    fullPlace: core.fullPlace,
    storage: core.storage,
  };
}

/** The table, from its parts in the workspace. */
function collect({ rowIndices }: Pattern, at: Layout, core: ColumnPlan, chainEnd: number): Int32Array {
  const { ints } = workspace;
  const slots = chainEnd + core.end - core.start;
  const table = takeInts(slots + rowIndices.length);
  table.set(ints.subarray(at.program, at.program + chainEnd));
  table.set(ints.subarray(core.start, core.end), chainEnd);
  table.set(ints.subarray(at.slot, at.slot + rowIndices.length), slots);
  return table;
}

/** Turns the number of the entry that each link changes into its place in w; for a link that changes none, its own empty second entry. */
function placeLinkEntries(at: Layout, leafCount: number, linkCount: number): void {
  const { ints } = workspace;
  let record = at.program + 2 * leafCount + 3;
  let own = at.offDiagonal + leafCount + 1;
  for (let k = 0; k < linkCount; k++) {
    const e = ints[record]!;
    ints[record] = e < 0 ? own : ints[at.slot + e]!;
    record += 4;
    own += 2;
  }
}
