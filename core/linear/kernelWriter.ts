/** Helps to write loops over a symmetric plan, for one system or for several side by side. */
import {
  type Arithmetic,
  type Code,
  FunctionWriter,
  I32,
  i32,
  type Local,
  pair,
  repeatWhile,
  twice,
  when,
} from './wasmWriter.ts';

/**
 * A block of memory begins with a header of byte addresses, in this order; a part ends where the next begins.
 * `leaves` to `slots` are the parts of the plan's table; `ends` is the pattern's columnStarts from its second entry on; `w` to `entriesEnd`
 * are the parts of w: the diagonal, the right-hand side, the entries of leaves, links, columns and full block.
 */
export const HEADER = [
  'leaves',
  'links',
  'columns',
  'fullNodes',
  'slots',
  'ends',
  'w',
  'y',
  'leafEntries',
  'linkEntries',
  'columnEntries',
  'fullEntries',
  'entriesEnd',
  'values',
] as const;

export type Part = (typeof HEADER)[number];

/** How many numbers a step works on at once: `vectors` times those of the arithmetic. */
export interface Width {
  readonly arithmetic: Arithmetic;
  readonly vectors: number;
}

/** Variables are named as in `symmetricSteps.ts`; a name ending in `At` is a byte address. */
export class KernelWriter {
  readonly arithmetic: Arithmetic;
  /** Bytes from one number of a system to the next. */
  readonly stride: number;
  private readonly shift: number;
  private readonly vectors: number;
  private readonly writer = new FunctionWriter(1);

  constructor({ arithmetic, vectors }: Width) {
    this.arithmetic = arithmetic;
    this.vectors = vectors;
    this.stride = arithmetic.bytes * vectors;
    this.shift = Math.log2(this.stride);
  }

  /** The function's entry in the module. */
  finish(body: Code): number[] {
    return this.writer.finish(body);
  }

  /** New variables that hold addresses or counts. */
  integers<Name extends string>(...names: Name[]): Record<Name, Local> {
    return Object.fromEntries(names.map((name) => [name, this.writer.local(I32)])) as Record<Name, Local>;
  }

  /** New variables that hold a number for each system. */
  numbers<Name extends string>(...names: Name[]): Record<Name, Local[]> {
    const one = (): Local[] => Array.from({ length: this.vectors }, () => this.writer.local(this.arithmetic.type));
    return Object.fromEntries(names.map((name) => [name, one()])) as Record<Name, Local[]>;
  }

  /** The address of a part of the block. */
  part(name: Part): Code {
    return i32.load(this.writer.parameters[0]!.get, 4 * HEADER.indexOf(name));
  }

  /** Sets each of these variables to the part of its name. */
  start(variables: Partial<Record<Part, Local>>): Code {
    return Object.entries(variables).flatMap(([name, local]) => local.set(this.part(name as Part)));
  }

  /** Code for each vector in turn, given its index and its offset in bytes. */
  each(code: (j: number, offset: number) => Code): Code {
    return Array.from({ length: this.vectors }, (_, j) => code(j, j * this.arithmetic.bytes));
  }

  /** The address of the number, counted from `base`, whose index stands at `tableAt` + offset. */
  follow(base: Local, tableAt: Local, offset = 0): Code {
    return i32.add(base.get, this.scaled(i32.load(tableAt.get, offset)));
  }

  /** Bytes that so many numbers take. */
  scaled(count: Code): Code {
    return i32.shiftLeft(count, this.shift);
  }

  advance(at: Local, bytes: number): Code {
    return at.set(i32.add(at.get, i32.constant(bytes)));
  }

  /** target -= l * factor, for the vector at `offset`. */
  take(target: Local, l: Local, factor: Code, offset: number): Code {
    const { load, store, subtract, multiply } = this.arithmetic;
    return store(target.get, subtract(load(target.get, offset), multiply(l.get, factor)), offset);
  }

  /**
   * target -= l0 u0, then target -= l1 u1, for all numbers up to where u0 ends; all three addresses move on. With one system the numbers
   * are neighbours and are taken in pairs; the rounding is the same.
   */
  takeBoth(
    target: Local,
    [u0, u1]: readonly [Local, Local],
    end: Local,
    [l0, l1]: readonly [readonly Local[], readonly Local[]],
  ): Code {
    const step = (a: Arithmetic, m0: Code, m1: Code, o: number): Code => {
      const once = a.subtract(a.load(target.get, o), a.multiply(m0, a.load(u0.get, o)));
      return a.store(target.get, a.subtract(once, a.multiply(m1, a.load(u1.get, o))), o);
    };
    const move = (bytes: number): Code => [target, u0, u1].flatMap((at) => this.advance(at, bytes));
    const single = this.loop(u0, end, [
      this.each((j, o) => step(this.arithmetic, l0[j]!.get, l1[j]!.get, o)),
      move(this.stride),
    ]);
    if (this.vectors > 1) return single;
    const [m0, m1] = [this.writer.local(pair.type), this.writer.local(pair.type)];
    const last = this.writer.local(I32);
    return [
      m0.set(twice(l0[0]!.get)),
      m1.set(twice(l1[0]!.get)),
      last.set(i32.subtract(end.get, i32.constant(2 * pair.bytes - 1))),
      this.loop(u0, last, [
        step(pair, m0.get, m1.get, 0),
        step(pair, m0.get, m1.get, pair.bytes),
        move(2 * pair.bytes),
      ]),
      ...single,
    ];
  }

  /** r = 1 / d, also stored in place of d. */
  invert(dAt: Local, r: readonly Local[]): Code {
    const { constant, divide, load, store } = this.arithmetic;
    return this.each((j, o) => [r[j]!.set(divide(constant(1), load(dAt.get, o))), store(dAt.get, r[j]!.get, o)]);
  }

  /** Runs the body while `at` is below `end`. */
  loop(at: Local, end: Local, body: Code): Code {
    const below = i32.less(at.get, end.get);
    return when(below, repeatWhile(body, below));
  }
}
