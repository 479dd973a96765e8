/** The elimination of `symmetricSteps.ts`, for a compiled kernel: the same operations in the same order. */
import type { KernelWriter } from './kernelWriter.ts';
import { type Code, i32, type Local } from './wasmWriter.ts';

/** Factors the matrix in place into L and 1/D and carries the right-hand side along. */
export function eliminate(k: KernelWriter): Code {
  return [eliminateLeaves(k), eliminateLinks(k), eliminateColumns(k), eliminateFull(k)];
}

function eliminateLeaves(k: KernelWriter): Code {
  const { load, store, multiply } = k.arithmetic;
  const { w, y, leaves, links, leafEntries } = k.integers('w', 'y', 'leaves', 'links', 'leafEntries');
  const { vAt, pAt, yvAt, ypAt } = k.integers('vAt', 'pAt', 'yvAt', 'ypAt');
  const { r, u, l } = k.numbers('r', 'u', 'l');
  return [
    k.start({ w, y, leaves, links, leafEntries }),
    k.loop(leaves, links, [
      vAt.set(k.follow(w, leaves)),
      pAt.set(k.follow(w, leaves, 4)),
      yvAt.set(k.follow(y, leaves)),
      ypAt.set(k.follow(y, leaves, 4)),
      k.invert(vAt, r),
      k.each((j, o) => [
        u[j]!.set(load(leafEntries.get, o)),
        l[j]!.set(multiply(u[j]!.get, r[j]!.get)),
        store(leafEntries.get, l[j]!.get, o),
        k.take(pAt, l[j]!, u[j]!.get, o),
        k.take(ypAt, l[j]!, load(yvAt.get, o), o),
      ]),
      k.advance(leafEntries, k.stride),
      k.advance(leaves, 8),
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
    k.start({ w, y, links, columns, linkEntries }),
    k.loop(links, columns, [
      vAt.set(k.follow(w, links)),
      aAt.set(k.follow(w, links, 4)),
      bAt.set(k.follow(w, links, 8)),
      cAt.set(k.follow(w, links, 12)),
      yvAt.set(k.follow(y, links)),
      yaAt.set(k.follow(y, links, 4)),
      ybAt.set(k.follow(y, links, 8)),
      k.invert(vAt, r),
      k.each((j, o) => [
        yv[j]!.set(load(yvAt.get, o)),
        ua[j]!.set(load(linkEntries.get, o)),
        ub[j]!.set(load(linkEntries.get, stride + o)),
        la[j]!.set(multiply(ua[j]!.get, r[j]!.get)),
        lb[j]!.set(multiply(ub[j]!.get, r[j]!.get)),
        k.take(aAt, la[j]!, ua[j]!.get, o),
        k.take(bAt, lb[j]!, ub[j]!.get, o),
        k.take(cAt, la[j]!, ub[j]!.get, o),
        k.take(yaAt, la[j]!, yv[j]!.get, o),
        k.take(ybAt, lb[j]!, yv[j]!.get, o),
        store(linkEntries.get, la[j]!.get, o),
        store(linkEntries.get, lb[j]!.get, stride + o),
      ]),
      k.advance(linkEntries, 2 * stride),
      k.advance(links, 16),
    ]),
  ];
}

function eliminateColumns(k: KernelWriter): Code {
  const { load, store, multiply } = k.arithmetic;
  const { w, y, columns, fullNodes, columnEntries } = k.integers('w', 'y', 'columns', 'fullNodes', 'columnEntries');
  const { vAt, d, row, rAt, yrAt, end, s, cAt } = k.integers('vAt', 'd', 'row', 'rAt', 'yrAt', 'end', 's', 'cAt');
  const { r, u, l, yv } = k.numbers('r', 'u', 'l', 'yv');
  return [
    k.start({ w, y, columns, fullNodes, columnEntries }),
    k.loop(columns, fullNodes, [
      vAt.set(k.follow(w, columns)),
      k.invert(vAt, r),
      vAt.set(k.follow(y, columns)),
      k.each((j, o) => yv[j]!.set(load(vAt.get, o))),
      d.set(i32.load(columns.get, 4)),
      end.set(i32.add(columnEntries.get, k.scaled(d.get))),
      row.set(i32.add(columns.get, i32.constant(8))),
      columns.set(i32.add(row.get, i32.shiftLeft(d.get, 2))),
      k.loop(columnEntries, end, [
        rAt.set(k.follow(w, row)),
        yrAt.set(k.follow(y, row)),
        k.each((j, o) => [
          u[j]!.set(load(columnEntries.get, o)),
          l[j]!.set(multiply(u[j]!.get, r[j]!.get)),
          k.take(rAt, l[j]!, u[j]!.get, o),
          k.take(yrAt, l[j]!, yv[j]!.get, o),
        ]),
        s.set(i32.add(columnEntries.get, i32.constant(k.stride))),
        k.loop(s, end, [
          cAt.set(k.follow(w, columns)),
          k.each((j, o) => k.take(cAt, l[j]!, load(s.get, o), o)),
          k.advance(s, k.stride),
          k.advance(columns, 4),
        ]),
        k.each((j, o) => store(columnEntries.get, l[j]!.get, o)),
        k.advance(row, 4),
        k.advance(columnEntries, k.stride),
      ]),
      k.advance(columns, 4),
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
    at.set(k.follow(w, fullNodes, offset)),
    k.invert(at, r),
    at.set(k.follow(y, fullNodes, offset)),
    k.each((j, o) => yv[j]!.set(load(at.get, o))),
  ];
  const remaining = i32.quarter(i32.subtract(slots.get, fullNodes.get));
  return [
    k.start({ w, y, fullNodes, slots, fullEntries }),
    last.set(i32.subtract(slots.get, i32.constant(4))),
    k.loop(fullNodes, last, [
      // Row p has an entry for each node after it; row q follows, one shorter; then the rest.
      row.set(i32.add(fullEntries.get, k.scaled(i32.subtract(remaining, i32.constant(1))))),
      rest.set(i32.add(row.get, k.scaled(i32.subtract(remaining, i32.constant(2))))),
      pivot(0, rp, yp),
      eliminateNext(k, { w, y, nodes: fullNodes, entries: fullEntries, row }, rp, yp),
      pivot(4, rq, yq),
      k.advance(fullNodes, 8),
      k.advance(fullEntries, k.stride),
      eliminateRest(k, { w, y, nodes: fullNodes, entries: fullEntries, row, rest }, { rp, yp, rq, yq }),
      fullEntries.set(rest.get),
    ]),
    k.loop(fullNodes, slots, [pivot(0, rp, yp), k.advance(fullNodes, 4)]),
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
    at.set(k.follow(w, nodes, 4)),
    k.each((j, o) => [
      u[j]!.set(load(entries.get, o)),
      l[j]!.set(multiply(u[j]!.get, rp[j]!.get)),
      k.take(at, l[j]!, u[j]!.get, o),
      store(entries.get, l[j]!.get, o),
    ]),
    at.set(k.follow(y, nodes, 4)),
    k.each((j, o) => k.take(at, l[j]!, yp[j]!.get, o)),
    s.set(i32.add(entries.get, i32.constant(k.stride))),
    target.set(row.get),
    k.loop(s, row, [
      k.each((j, o) => k.take(target, l[j]!, load(s.get, o), o)),
      k.advance(s, k.stride),
      k.advance(target, k.stride),
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
    node.set(nodes.get),
    q.set(row.get),
    end.set(row.get),
    target.set(rest.get),
    k.loop(entries, end, [
      k.each((j, o) => [
        up[j]!.set(load(entries.get, o)),
        uq[j]!.set(load(q.get, o)),
        lp[j]!.set(multiply(up[j]!.get, rp[j]!.get)),
        lq[j]!.set(multiply(uq[j]!.get, rq[j]!.get)),
      ]),
      at.set(k.follow(w, node)),
      k.each((j, o) => [k.take(at, lp[j]!, up[j]!.get, o), k.take(at, lq[j]!, uq[j]!.get, o)]),
      at.set(k.follow(y, node)),
      k.each((j, o) => [k.take(at, lp[j]!, yp[j]!.get, o), k.take(at, lq[j]!, yq[j]!.get, o)]),
      sp.set(i32.add(entries.get, i32.constant(k.stride))),
      sq.set(i32.add(q.get, i32.constant(k.stride))),
      k.takeBoth(target, [sp, sq], end, [lp, lq]),
      k.each((j, o) => [store(entries.get, lp[j]!.get, o), store(q.get, lq[j]!.get, o)]),
      k.advance(node, 4),
      k.advance(q, k.stride),
      k.advance(entries, k.stride),
    ]),
  ];
}
