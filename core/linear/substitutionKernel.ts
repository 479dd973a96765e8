/** The substitutions of `symmetricSteps.ts`, for a compiled kernel: the same operations in the same order. */
import type { KernelWriter } from './kernelWriter.ts';
import { type Code, i32, type Local } from './wasmWriter.ts';

/** y = L⁻¹ y. */
export function solveForward(k: KernelWriter): Code {
  return [forwardLeaves(k), forwardLinks(k), forwardColumns(k), forwardFull(k)];
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
    k.start({ y, leaves, links, leafEntries }),
    k.loop(leaves, links, [
      yvAt.set(k.follow(y, leaves)),
      ypAt.set(k.follow(y, leaves, 4)),
      k.each((j, o) => [l[j]!.set(load(leafEntries.get, o)), k.take(ypAt, l[j]!, load(yvAt.get, o), o)]),
      k.advance(leafEntries, k.stride),
      k.advance(leaves, 8),
    ]),
  ];
}

function forwardLinks(k: KernelWriter): Code {
  const { load } = k.arithmetic;
  const { y, links, columns, linkEntries } = k.integers('y', 'links', 'columns', 'linkEntries');
  const { vAt, aAt, bAt } = k.integers('vAt', 'aAt', 'bAt');
  const { la, lb, yv } = k.numbers('la', 'lb', 'yv');
  return [
    k.start({ y, links, columns, linkEntries }),
    k.loop(links, columns, [
      vAt.set(k.follow(y, links)),
      aAt.set(k.follow(y, links, 4)),
      bAt.set(k.follow(y, links, 8)),
      k.each((j, o) => [
        yv[j]!.set(load(vAt.get, o)),
        la[j]!.set(load(linkEntries.get, o)),
        lb[j]!.set(load(linkEntries.get, k.stride + o)),
        k.take(aAt, la[j]!, yv[j]!.get, o),
        k.take(bAt, lb[j]!, yv[j]!.get, o),
      ]),
      k.advance(linkEntries, 2 * k.stride),
      k.advance(links, 16),
    ]),
  ];
}

function forwardColumns(k: KernelWriter): Code {
  const { load } = k.arithmetic;
  const { y, columns, fullNodes, columnEntries } = k.integers('y', 'columns', 'fullNodes', 'columnEntries');
  const { vAt, d, end } = k.integers('vAt', 'd', 'end');
  const { yv } = k.numbers('yv');
  return [
    k.start({ y, columns, fullNodes, columnEntries }),
    k.loop(columns, fullNodes, [
      vAt.set(k.follow(y, columns)),
      k.each((j, o) => yv[j]!.set(load(vAt.get, o))),
      d.set(i32.load(columns.get, 4)),
      end.set(i32.add(columnEntries.get, k.scaled(d.get))),
      k.advance(columns, 8),
      spread(k, { y, row: columns, entry: columnEntries, end }, yv),
      columns.set(i32.add(columns.get, i32.add(changedBytes(d), i32.constant(4)))),
    ]),
  ];
}

function forwardFull(k: KernelWriter): Code {
  const { load } = k.arithmetic;
  const { y, fullNodes, slots, fullEntries } = k.integers('y', 'fullNodes', 'slots', 'fullEntries');
  const { vAt, row, end } = k.integers('vAt', 'row', 'end');
  const { yv } = k.numbers('yv');
  return [
    k.start({ y, fullNodes, slots, fullEntries }),
    k.loop(fullNodes, slots, [
      vAt.set(k.follow(y, fullNodes)),
      k.each((j, o) => yv[j]!.set(load(vAt.get, o))),
      k.advance(fullNodes, 4),
      row.set(fullNodes.get),
      end.set(i32.add(fullEntries.get, k.scaled(i32.quarter(i32.subtract(slots.get, row.get))))),
      spread(k, { y, row, entry: fullEntries, end }, yv),
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
    rowAt.set(k.follow(y, row)),
    k.each((j, o) => [l[j]!.set(load(entry.get, o)), k.take(rowAt, l[j]!, yv[j]!.get, o)]),
    k.advance(row, 4),
    k.advance(entry, k.stride),
  ]);
}

/** s -= l y[row] for each entry of a column, downwards to its beginning. `row` starts beyond the last row. */
function collect(k: KernelWriter, { y, row, entry, end }: Column, s: readonly Local[]): Code {
  const { load, multiply, subtract } = k.arithmetic;
  const { rowAt } = k.integers('rowAt');
  return k.loop(end, entry, [
    k.advance(row, -4),
    k.advance(entry, -k.stride),
    rowAt.set(k.follow(y, row)),
    k.each((j, o) => s[j]!.set(subtract(s[j]!.get, multiply(load(entry.get, o), load(rowAt.get, o))))),
  ]);
}

/** y = L⁻ᵀ D⁻¹ y. */
export function solveBackward(k: KernelWriter): Code {
  return [backwardFull(k), backwardColumns(k), backwardLinks(k), backwardLeaves(k)];
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
    k.start({ w, y, fullNodes, slots, entriesEnd }),
    t.set(slots.get),
    k.loop(fullNodes, t, [
      k.advance(t, -4),
      rAt.set(k.follow(w, t)),
      vAt.set(k.follow(y, t)),
      divided(k, rAt, vAt, s),
      row.set(slots.get),
      // One entry for each node after this one.
      fullEntries.set(
        i32.subtract(entriesEnd.get, k.scaled(i32.quarter(i32.subtract(slots.get, i32.add(t.get, i32.constant(4)))))),
      ),
      collect(k, { y, row, entry: entriesEnd, end: fullEntries }, s),
      k.each((j, o) => store(vAt.get, s[j]!.get, o)),
    ]),
  ];
}

function backwardColumns(k: KernelWriter): Code {
  const { store } = k.arithmetic;
  const { w, y, columns, fullNodes, fullEntries } = k.integers('w', 'y', 'columns', 'fullNodes', 'fullEntries');
  const { rAt, vAt, d, row, end } = k.integers('rAt', 'vAt', 'd', 'row', 'end');
  const { s } = k.numbers('s');
  return [
    k.start({ w, y, columns, fullNodes, fullEntries }),
    k.loop(columns, fullNodes, [
      d.set(i32.load(i32.subtract(fullNodes.get, i32.constant(4)))),
      row.set(i32.subtract(fullNodes.get, i32.add(changedBytes(d), i32.constant(4)))),
      fullNodes.set(i32.subtract(row.get, i32.add(i32.shiftLeft(d.get, 2), i32.constant(8)))),
      rAt.set(k.follow(w, fullNodes)),
      vAt.set(k.follow(y, fullNodes)),
      divided(k, rAt, vAt, s),
      end.set(i32.subtract(fullEntries.get, k.scaled(d.get))),
      collect(k, { y, row, entry: fullEntries, end }, s),
      k.each((j, o) => store(vAt.get, s[j]!.get, o)),
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
    k.start({ w, y, links, columns, columnEntries }),
    k.loop(links, columns, [
      k.advance(columns, -16),
      k.advance(columnEntries, -2 * k.stride),
      rAt.set(k.follow(w, columns)),
      vAt.set(k.follow(y, columns)),
      aAt.set(k.follow(y, columns, 4)),
      bAt.set(k.follow(y, columns, 8)),
      k.each((_, o) => {
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
    k.start({ w, y, leaves, links, linkEntries }),
    k.loop(leaves, links, [
      k.advance(links, -8),
      k.advance(linkEntries, -k.stride),
      rAt.set(k.follow(w, links)),
      vAt.set(k.follow(y, links)),
      pAt.set(k.follow(y, links, 4)),
      k.each((_, o) => {
        const own = multiply(load(vAt.get, o), load(rAt.get, o));
        return store(vAt.get, subtract(own, multiply(load(linkEntries.get, o), load(pAt.get, o))), o);
      }),
    ]),
  ];
}
