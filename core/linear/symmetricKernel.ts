/**
 * The steps of `symmetricSteps.ts` as a WebAssembly module, for one system and for LANES systems of the same pattern side by side: the same
 * operations in the same order, each rounded once, so that the results agree with the plain ones bit for bit.
 */
import { SINGULAR } from './inspectPivots.ts';
import { KernelWriter, type Width } from './kernelWriter.ts';
import {
  type Code,
  clear,
  i32,
  type Local,
  pair,
  scalar,
  type WrittenFunction,
  when,
  writeModule,
} from './wasmWriter.ts';
import { WasmProgram } from './webAssembly.ts';

/** Systems side by side: enough to share the cost of the indices, few enough for all to stay in the processor's cache. */
export const LANES = 8;

/** The program; compiled when first needed. Each function takes the address of a block (see `HEADER`). */
export const symmetricProgram = new WasmProgram(() => {
  const one: Width = { arithmetic: scalar, vectors: 1 };
  const many: Width = { arithmetic: pair, vectors: LANES / 2 };
  return writeModule([
    // Return 1 when every pivot is positive and none has been lost; else 0, and there has been no substitution.
    write('refactor', one, (k) => [...load(k), ...eliminate(k), ...inspect(k)]),
    write('refactorAndSolve', one, refactorAndSolve),
    write('refactorAndSolveLanes', many, refactorAndSolve),
    write('solve', one, (k) => [...solveForward(k), ...solveBackward(k), ...i32.constant(1)]),
    write('substitute', one, (k) => [...solveBackward(k), ...i32.constant(1)]),
    write('substituteLanes', many, (k) => [...solveBackward(k), ...i32.constant(1)]),
  ]);
});

function write(name: string, width: Width, body: (k: KernelWriter) => Code): WrittenFunction {
  const k = new KernelWriter(width);
  return { name, parameterCount: 1, entry: k.finish(body(k)) };
}

function refactorAndSolve(k: KernelWriter): Code {
  const { sound } = k.integers('sound');
  return [...load(k), ...eliminate(k), ...sound.set(inspect(k)), ...when(sound.get, solveBackward(k)), ...sound.get];
}

/** Clears what the matrix does not set and puts its values in their places. */
function load(k: KernelWriter): Code {
  const { load, store, constant } = k.arithmetic;
  const { w, slots, ends, values, target, nobody } = k.integers('w', 'slots', 'ends', 'values', 'target', 'nobody');
  const clearBefore = (end: Code): Code => [
    ...nobody.set(i32.subtract(end, i32.constant(k.stride))),
    ...k.each((_, o) => store(nobody.get, constant(0), o)),
  ];
  return [
    ...clear(k.part('linkEntries'), i32.subtract(k.part('entriesEnd'), k.part('linkEntries'))),
    ...clearBefore(k.part('y')),
    ...clearBefore(k.part('leafEntries')),
    ...k.start({ w, slots, ends, values }),
    ...k.loop(slots, ends, [
      ...target.set(k.follow(w, slots)),
      ...k.each((_, o) => store(target.get, load(values.get, o), o)),
      ...k.advance(values, k.stride),
      ...k.advance(slots, 4),
    ]),
  ];
}

function eliminate(k: KernelWriter): Code {
  return [...eliminateLeaves(k), ...eliminateLinks(k), ...eliminateColumns(k), ...eliminateFull(k)];
}

function eliminateLeaves(k: KernelWriter): Code {
  const { load, store, multiply } = k.arithmetic;
  const { w, y, leaves, links, leafEntries } = k.integers('w', 'y', 'leaves', 'links', 'leafEntries');
  const { vAt, pAt, yvAt, ypAt } = k.integers('vAt', 'pAt', 'yvAt', 'ypAt');
  const { r, u, l } = k.numbers('r', 'u', 'l');
  return [
    ...k.start({ w, y, leaves, links, leafEntries }),
    ...k.loop(leaves, links, [
      ...vAt.set(k.follow(w, leaves)),
      ...pAt.set(k.follow(w, leaves, 4)),
      ...yvAt.set(k.follow(y, leaves)),
      ...ypAt.set(k.follow(y, leaves, 4)),
      ...k.invert(vAt, r),
      ...k.each((j, o) => [
        ...u[j]!.set(load(leafEntries.get, o)),
        ...l[j]!.set(multiply(u[j]!.get, r[j]!.get)),
        ...store(leafEntries.get, l[j]!.get, o),
        ...k.take(pAt, l[j]!, u[j]!.get, o),
        ...k.take(ypAt, l[j]!, load(yvAt.get, o), o),
      ]),
      ...k.advance(leafEntries, k.stride),
      ...k.advance(leaves, 8),
    ]),
  ];
}

function eliminateLinks(k: KernelWriter): Code {
  const { load, store, multiply } = k.arithmetic;
  const { stride } = k;
  const { w, y, links, columns, linkEntries } = k.integers('w', 'y', 'links', 'columns', 'linkEntries');
  const { vAt, aAt, bAt, cAt, yvAt, yaAt, ybAt } = k.integers('vAt', 'aAt', 'bAt', 'cAt', 'yvAt', 'yaAt', 'ybAt');
  const { r, ua, ub, la, lb, yv } = k.numbers('r', 'ua', 'ub', 'la', 'lb', 'yv');
  return [
    ...k.start({ w, y, links, columns, linkEntries }),
    ...k.loop(links, columns, [
      ...vAt.set(k.follow(w, links)),
      ...aAt.set(k.follow(w, links, 4)),
      ...bAt.set(k.follow(w, links, 8)),
      ...cAt.set(k.follow(w, links, 12)),
      ...yvAt.set(k.follow(y, links)),
      ...yaAt.set(k.follow(y, links, 4)),
      ...ybAt.set(k.follow(y, links, 8)),
      ...k.invert(vAt, r),
      ...k.each((j, o) => [
        ...yv[j]!.set(load(yvAt.get, o)),
        ...ua[j]!.set(load(linkEntries.get, o)),
        ...ub[j]!.set(load(linkEntries.get, stride + o)),
        ...la[j]!.set(multiply(ua[j]!.get, r[j]!.get)),
        ...lb[j]!.set(multiply(ub[j]!.get, r[j]!.get)),
        ...k.take(aAt, la[j]!, ua[j]!.get, o),
        ...k.take(bAt, lb[j]!, ub[j]!.get, o),
        ...k.take(cAt, la[j]!, ub[j]!.get, o),
        ...k.take(yaAt, la[j]!, yv[j]!.get, o),
        ...k.take(ybAt, lb[j]!, yv[j]!.get, o),
        ...store(linkEntries.get, la[j]!.get, o),
        ...store(linkEntries.get, lb[j]!.get, stride + o),
      ]),
      ...k.advance(linkEntries, 2 * stride),
      ...k.advance(links, 16),
    ]),
  ];
}

function eliminateColumns(k: KernelWriter): Code {
  const { load, store, multiply } = k.arithmetic;
  const { w, y, columns, fullNodes, columnEntries } = k.integers('w', 'y', 'columns', 'fullNodes', 'columnEntries');
  const { vAt, d, row, rAt, yrAt, end, s, cAt } = k.integers('vAt', 'd', 'row', 'rAt', 'yrAt', 'end', 's', 'cAt');
  const { r, u, l, yv } = k.numbers('r', 'u', 'l', 'yv');
  return [
    ...k.start({ w, y, columns, fullNodes, columnEntries }),
    ...k.loop(columns, fullNodes, [
      ...vAt.set(k.follow(w, columns)),
      ...k.invert(vAt, r),
      ...vAt.set(k.follow(y, columns)),
      ...k.each((j, o) => yv[j]!.set(load(vAt.get, o))),
      ...d.set(i32.load(columns.get, 4)),
      ...end.set(i32.add(columnEntries.get, k.scaled(d.get))),
      ...row.set(i32.add(columns.get, i32.constant(8))),
      ...columns.set(i32.add(row.get, i32.shiftLeft(d.get, 2))),
      ...k.loop(columnEntries, end, [
        ...rAt.set(k.follow(w, row)),
        ...yrAt.set(k.follow(y, row)),
        ...k.each((j, o) => [
          ...u[j]!.set(load(columnEntries.get, o)),
          ...l[j]!.set(multiply(u[j]!.get, r[j]!.get)),
          ...k.take(rAt, l[j]!, u[j]!.get, o),
          ...k.take(yrAt, l[j]!, yv[j]!.get, o),
        ]),
        ...s.set(i32.add(columnEntries.get, i32.constant(k.stride))),
        ...k.loop(s, end, [
          ...cAt.set(k.follow(w, columns)),
          ...k.each((j, o) => k.take(cAt, l[j]!, load(s.get, o), o)),
          ...k.advance(s, k.stride),
          ...k.advance(columns, 4),
        ]),
        ...k.each((j, o) => store(columnEntries.get, l[j]!.get, o)),
        ...k.advance(row, 4),
        ...k.advance(columnEntries, k.stride),
      ]),
      ...k.advance(columns, 4),
    ]),
  ];
}

/** The full block, two pivots p and q at a time, so that each number of the rest is fetched half as often. */
function eliminateFull(k: KernelWriter): Code {
  const { load } = k.arithmetic;
  const { w, y, fullNodes, slots, fullEntries, last } = k.integers(
    'w',
    'y',
    'fullNodes',
    'slots',
    'fullEntries',
    'last',
  );
  const { row, rest, at } = k.integers('row', 'rest', 'at');
  const { rp, yp, rq, yq } = k.numbers('rp', 'yp', 'rq', 'yq');
  const pivot = (offset: number, r: Local[], yv: Local[]): Code => [
    ...at.set(k.follow(w, fullNodes, offset)),
    ...k.invert(at, r),
    ...at.set(k.follow(y, fullNodes, offset)),
    ...k.each((j, o) => yv[j]!.set(load(at.get, o))),
  ];
  const remaining = i32.quarter(i32.subtract(slots.get, fullNodes.get));
  return [
    ...k.start({ w, y, fullNodes, slots, fullEntries }),
    ...last.set(i32.subtract(slots.get, i32.constant(4))),
    ...k.loop(fullNodes, last, [
      // Row p has an entry for each node after it; row q follows, one shorter; then the rest.
      ...row.set(i32.add(fullEntries.get, k.scaled(i32.subtract(remaining, i32.constant(1))))),
      ...rest.set(i32.add(row.get, k.scaled(i32.subtract(remaining, i32.constant(2))))),
      ...pivot(0, rp, yp),
      ...eliminateNext(k, { w, y, nodes: fullNodes, entries: fullEntries, row }, rp, yp),
      ...pivot(4, rq, yq),
      ...k.advance(fullNodes, 8),
      ...k.advance(fullEntries, k.stride),
      ...eliminateRest(k, { w, y, nodes: fullNodes, entries: fullEntries, row, rest }, { rp, yp, rq, yq }),
      ...fullEntries.set(rest.get),
    ]),
    ...k.loop(fullNodes, slots, [...pivot(0, rp, yp), ...k.advance(fullNodes, 4)]),
  ];
}

interface FullRows {
  readonly w: Local;
  readonly y: Local;
  /** In the table: the node of the row in hand. */
  readonly nodes: Local;
  /** The entry of pivot p in the column in hand. */
  readonly entries: Local;
  /** Where the row of pivot q begins, and that of p ends. */
  readonly row: Local;
}

/** Eliminates pivot p from the row of pivot q. */
function eliminateNext(k: KernelWriter, { w, y, nodes, entries, row }: FullRows, rp: Local[], yp: Local[]): Code {
  const { load, store, multiply } = k.arithmetic;
  const { at, s, target } = k.integers('at', 's', 'target');
  const { u, l } = k.numbers('u', 'l');
  return [
    ...at.set(k.follow(w, nodes, 4)),
    ...k.each((j, o) => [
      ...u[j]!.set(load(entries.get, o)),
      ...l[j]!.set(multiply(u[j]!.get, rp[j]!.get)),
      ...k.take(at, l[j]!, u[j]!.get, o),
      ...store(entries.get, l[j]!.get, o),
    ]),
    ...at.set(k.follow(y, nodes, 4)),
    ...k.each((j, o) => k.take(at, l[j]!, yp[j]!.get, o)),
    ...s.set(i32.add(entries.get, i32.constant(k.stride))),
    ...target.set(row.get),
    ...k.loop(s, row, [
      ...k.each((j, o) => k.take(target, l[j]!, load(s.get, o), o)),
      ...k.advance(s, k.stride),
      ...k.advance(target, k.stride),
    ]),
  ];
}

/** Eliminates pivots p and q from all rows after them. */
function eliminateRest(
  k: KernelWriter,
  { w, y, nodes, entries, row, rest }: FullRows & { readonly rest: Local },
  { rp, yp, rq, yq }: Record<'rp' | 'yp' | 'rq' | 'yq', Local[]>,
): Code {
  const { load, store, multiply } = k.arithmetic;
  const { node, q, at, sp, sq, target, end } = k.integers('node', 'q', 'at', 'sp', 'sq', 'target', 'end');
  const { up, uq, lp, lq } = k.numbers('up', 'uq', 'lp', 'lq');
  return [
    ...node.set(nodes.get),
    ...q.set(row.get),
    ...end.set(row.get),
    ...target.set(rest.get),
    ...k.loop(entries, end, [
      ...k.each((j, o) => [
        ...up[j]!.set(load(entries.get, o)),
        ...uq[j]!.set(load(q.get, o)),
        ...lp[j]!.set(multiply(up[j]!.get, rp[j]!.get)),
        ...lq[j]!.set(multiply(uq[j]!.get, rq[j]!.get)),
      ]),
      ...at.set(k.follow(w, node)),
      ...k.each((j, o) => [...k.take(at, lp[j]!, up[j]!.get, o), ...k.take(at, lq[j]!, uq[j]!.get, o)]),
      ...at.set(k.follow(y, node)),
      ...k.each((j, o) => [...k.take(at, lp[j]!, yp[j]!.get, o), ...k.take(at, lq[j]!, yq[j]!.get, o)]),
      ...sp.set(i32.add(entries.get, i32.constant(k.stride))),
      ...sq.set(i32.add(q.get, i32.constant(k.stride))),
      ...k.takeBoth(target, [sp, sq], end, [lp, lq]),
      ...k.each((j, o) => [...store(entries.get, lp[j]!.get, o), ...store(q.get, lq[j]!.get, o)]),
      ...k.advance(node, 4),
      ...k.advance(q, k.stride),
      ...k.advance(entries, k.stride),
    ]),
  ];
}

/** 1 when every pivot is positive and none has been lost, by the measure of `inspectPivots` for that case; else 0. */
function inspect(k: KernelWriter): Code {
  const { allAtMost, constant, load, magnitude, multiply } = k.arithmetic;
  const { w, y, ends, values, aAt, sound } = k.integers('w', 'y', 'ends', 'values', 'aAt', 'sound');
  return [
    ...k.start({ w, y, ends, values }),
    ...y.set(i32.subtract(y.get, i32.constant(k.stride))), // nobody's diagonal ends the list
    ...values.set(i32.subtract(values.get, i32.constant(k.stride))), // an end is one beyond its diagonal entry
    ...sound.set(i32.constant(1)),
    ...k.loop(w, y, [
      ...aAt.set(k.follow(values, ends)),
      ...k.each((_, o) =>
        sound.set(
          i32.and(
            sound.get,
            i32.and(
              allAtMost(constant(0), load(w.get, o)),
              allAtMost(magnitude(multiply(load(w.get, o), load(aAt.get, o))), constant(1 / SINGULAR)),
            ),
          ),
        ),
      ),
      ...k.advance(ends, 4),
      ...k.advance(w, k.stride),
    ]),
    ...sound.get,
  ];
}

/** y = L⁻¹ y. */
function solveForward(k: KernelWriter): Code {
  return [...forwardLeaves(k), ...forwardLinks(k), ...forwardColumns(k), ...forwardFull(k)];
}

function forwardLeaves(k: KernelWriter): Code {
  const { load } = k.arithmetic;
  const { y, leaves, links, leafEntries, yvAt, ypAt } = k.integers(
    'y',
    'leaves',
    'links',
    'leafEntries',
    'yvAt',
    'ypAt',
  );
  const { l } = k.numbers('l');
  return [
    ...k.start({ y, leaves, links, leafEntries }),
    ...k.loop(leaves, links, [
      ...yvAt.set(k.follow(y, leaves)),
      ...ypAt.set(k.follow(y, leaves, 4)),
      ...k.each((j, o) => [...l[j]!.set(load(leafEntries.get, o)), ...k.take(ypAt, l[j]!, load(yvAt.get, o), o)]),
      ...k.advance(leafEntries, k.stride),
      ...k.advance(leaves, 8),
    ]),
  ];
}

function forwardLinks(k: KernelWriter): Code {
  const { load } = k.arithmetic;
  const { y, links, columns, linkEntries } = k.integers('y', 'links', 'columns', 'linkEntries');
  const { vAt, aAt, bAt } = k.integers('vAt', 'aAt', 'bAt');
  const { la, lb, yv } = k.numbers('la', 'lb', 'yv');
  return [
    ...k.start({ y, links, columns, linkEntries }),
    ...k.loop(links, columns, [
      ...vAt.set(k.follow(y, links)),
      ...aAt.set(k.follow(y, links, 4)),
      ...bAt.set(k.follow(y, links, 8)),
      ...k.each((j, o) => [
        ...yv[j]!.set(load(vAt.get, o)),
        ...la[j]!.set(load(linkEntries.get, o)),
        ...lb[j]!.set(load(linkEntries.get, k.stride + o)),
        ...k.take(aAt, la[j]!, yv[j]!.get, o),
        ...k.take(bAt, lb[j]!, yv[j]!.get, o),
      ]),
      ...k.advance(linkEntries, 2 * k.stride),
      ...k.advance(links, 16),
    ]),
  ];
}

function forwardColumns(k: KernelWriter): Code {
  const { load } = k.arithmetic;
  const { y, columns, fullNodes, columnEntries } = k.integers('y', 'columns', 'fullNodes', 'columnEntries');
  const { vAt, d, end } = k.integers('vAt', 'd', 'end');
  const { yv } = k.numbers('yv');
  return [
    ...k.start({ y, columns, fullNodes, columnEntries }),
    ...k.loop(columns, fullNodes, [
      ...vAt.set(k.follow(y, columns)),
      ...k.each((j, o) => yv[j]!.set(load(vAt.get, o))),
      ...d.set(i32.load(columns.get, 4)),
      ...end.set(i32.add(columnEntries.get, k.scaled(d.get))),
      ...k.advance(columns, 8),
      ...spread(k, { y, row: columns, entry: columnEntries, end }, yv),
      ...columns.set(i32.add(columns.get, i32.add(changedBytes(d), i32.constant(4)))),
    ]),
  ];
}

function forwardFull(k: KernelWriter): Code {
  const { load } = k.arithmetic;
  const { y, fullNodes, slots, fullEntries } = k.integers('y', 'fullNodes', 'slots', 'fullEntries');
  const { vAt, row, end } = k.integers('vAt', 'row', 'end');
  const { yv } = k.numbers('yv');
  return [
    ...k.start({ y, fullNodes, slots, fullEntries }),
    ...k.loop(fullNodes, slots, [
      ...vAt.set(k.follow(y, fullNodes)),
      ...k.each((j, o) => yv[j]!.set(load(vAt.get, o))),
      ...k.advance(fullNodes, 4),
      ...row.set(fullNodes.get),
      ...end.set(i32.add(fullEntries.get, k.scaled(i32.quarter(i32.subtract(slots.get, row.get))))),
      ...spread(k, { y, row, entry: fullEntries, end }, yv),
    ]),
  ];
}

/** Bytes of table that the places changed by a column of d entries take: 4 d (d - 1) / 2. */
function changedBytes(d: Local): Code {
  return i32.shiftLeft(i32.multiply(d.get, i32.subtract(d.get, i32.constant(1))), 1);
}

/** A list of rows in the table, and the multipliers that go with them. */
interface Column {
  readonly y: Local;
  readonly row: Local;
  readonly entry: Local;
  /** Where the multipliers end, or begin. */
  readonly end: Local;
}

/** y[row] -= l y[v] for each entry of a column, upwards to its end. */
function spread(k: KernelWriter, { y, row, entry, end }: Column, yv: readonly Local[]): Code {
  const { load } = k.arithmetic;
  const { rowAt } = k.integers('rowAt');
  const { l } = k.numbers('l');
  return k.loop(entry, end, [
    ...rowAt.set(k.follow(y, row)),
    ...k.each((j, o) => [...l[j]!.set(load(entry.get, o)), ...k.take(rowAt, l[j]!, yv[j]!.get, o)]),
    ...k.advance(row, 4),
    ...k.advance(entry, k.stride),
  ]);
}

/** s -= l y[row] for each entry of a column, downwards to its beginning. `row` starts beyond the last row. */
function collect(k: KernelWriter, { y, row, entry, end }: Column, s: readonly Local[]): Code {
  const { load, multiply, subtract } = k.arithmetic;
  const { rowAt } = k.integers('rowAt');
  return k.loop(end, entry, [
    ...k.advance(row, -4),
    ...k.advance(entry, -k.stride),
    ...rowAt.set(k.follow(y, row)),
    ...k.each((j, o) => s[j]!.set(subtract(s[j]!.get, multiply(load(entry.get, o), load(rowAt.get, o))))),
  ]);
}

/** y = L⁻ᵀ D⁻¹ y. */
function solveBackward(k: KernelWriter): Code {
  return [...backwardFull(k), ...backwardColumns(k), ...backwardLinks(k), ...backwardLeaves(k)];
}

/** s = y[v] r, the division that D⁻¹ asks for. */
function divided(k: KernelWriter, rAt: Local, vAt: Local, s: readonly Local[]): Code {
  const { load, multiply } = k.arithmetic;
  return k.each((j, o) => s[j]!.set(multiply(load(vAt.get, o), load(rAt.get, o))));
}

function backwardFull(k: KernelWriter): Code {
  const { store } = k.arithmetic;
  const { w, y, fullNodes, slots, fullEntries, entriesEnd } = k.integers(
    'w',
    'y',
    'fullNodes',
    'slots',
    'fullEntries',
    'entriesEnd',
  );
  const { t, rAt, vAt, row } = k.integers('t', 'rAt', 'vAt', 'row');
  const { s } = k.numbers('s');
  return [
    ...k.start({ w, y, fullNodes, slots, entriesEnd }),
    ...t.set(slots.get),
    ...k.loop(fullNodes, t, [
      ...k.advance(t, -4),
      ...rAt.set(k.follow(w, t)),
      ...vAt.set(k.follow(y, t)),
      ...divided(k, rAt, vAt, s),
      ...row.set(slots.get),
      // One entry for each node after this one.
      ...fullEntries.set(
        i32.subtract(entriesEnd.get, k.scaled(i32.quarter(i32.subtract(slots.get, i32.add(t.get, i32.constant(4)))))),
      ),
      ...collect(k, { y, row, entry: entriesEnd, end: fullEntries }, s),
      ...k.each((j, o) => store(vAt.get, s[j]!.get, o)),
    ]),
  ];
}

function backwardColumns(k: KernelWriter): Code {
  const { store } = k.arithmetic;
  const { w, y, columns, fullNodes, fullEntries } = k.integers('w', 'y', 'columns', 'fullNodes', 'fullEntries');
  const { rAt, vAt, d, row, end } = k.integers('rAt', 'vAt', 'd', 'row', 'end');
  const { s } = k.numbers('s');
  return [
    ...k.start({ w, y, columns, fullNodes, fullEntries }),
    ...k.loop(columns, fullNodes, [
      ...d.set(i32.load(i32.subtract(fullNodes.get, i32.constant(4)))),
      ...row.set(i32.subtract(fullNodes.get, i32.add(changedBytes(d), i32.constant(4)))),
      ...fullNodes.set(i32.subtract(row.get, i32.add(i32.shiftLeft(d.get, 2), i32.constant(8)))),
      ...rAt.set(k.follow(w, fullNodes)),
      ...vAt.set(k.follow(y, fullNodes)),
      ...divided(k, rAt, vAt, s),
      ...end.set(i32.subtract(fullEntries.get, k.scaled(d.get))),
      ...collect(k, { y, row, entry: fullEntries, end }, s),
      ...k.each((j, o) => store(vAt.get, s[j]!.get, o)),
    ]),
  ];
}

function backwardLinks(k: KernelWriter): Code {
  const { load, multiply, store, subtract } = k.arithmetic;
  const { w, y, links, columns, columnEntries } = k.integers('w', 'y', 'links', 'columns', 'columnEntries');
  const { rAt, vAt, aAt, bAt } = k.integers('rAt', 'vAt', 'aAt', 'bAt');
  const term = (offset: number, at: Local, o: number): Code =>
    multiply(load(columnEntries.get, offset + o), load(at.get, o));
  return [
    ...k.start({ w, y, links, columns, columnEntries }),
    ...k.loop(links, columns, [
      ...k.advance(columns, -16),
      ...k.advance(columnEntries, -2 * k.stride),
      ...rAt.set(k.follow(w, columns)),
      ...vAt.set(k.follow(y, columns)),
      ...aAt.set(k.follow(y, columns, 4)),
      ...bAt.set(k.follow(y, columns, 8)),
      ...k.each((_, o) => {
        const own = multiply(load(vAt.get, o), load(rAt.get, o));
        return store(vAt.get, subtract(subtract(own, term(0, aAt, o)), term(k.stride, bAt, o)), o);
      }),
    ]),
  ];
}

function backwardLeaves(k: KernelWriter): Code {
  const { load, multiply, store, subtract } = k.arithmetic;
  const { w, y, leaves, links, linkEntries } = k.integers('w', 'y', 'leaves', 'links', 'linkEntries');
  const { rAt, vAt, pAt } = k.integers('rAt', 'vAt', 'pAt');
  return [
    ...k.start({ w, y, leaves, links, linkEntries }),
    ...k.loop(leaves, links, [
      ...k.advance(links, -8),
      ...k.advance(linkEntries, -k.stride),
      ...rAt.set(k.follow(w, links)),
      ...vAt.set(k.follow(y, links)),
      ...pAt.set(k.follow(y, links, 4)),
      ...k.each((_, o) => {
        const own = multiply(load(vAt.get, o), load(rAt.get, o));
        return store(vAt.get, subtract(own, multiply(load(linkEntries.get, o), load(pAt.get, o))), o);
      }),
    ]),
  ];
}
