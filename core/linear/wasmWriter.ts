/** Writes a small WebAssembly module byte by byte: the binary format of the WebAssembly core specification, as far as it is needed here. */

/** Instructions: bytes, and instructions within instructions, laid end to end when the function is finished. */
export type Code = readonly (number | Code)[];

export const I32 = 0x7f;
const F64 = 0x7c;
const V128 = 0x7b;

/** Unsigned LEB128. */
function unsigned(n: number): number[] {
  const bytes: number[] = [];
  let rest = n;
  while (rest > 127) {
    bytes.push((rest & 127) | 128);
    rest = Math.floor(rest / 128);
  }
  return [...bytes, rest];
}

/** Signed LEB128, for 32-bit integers. */
function signed(n: number): number[] {
  const bytes: number[] = [];
  let rest = n;
  while (rest < -64 || rest > 63) {
    bytes.push((rest & 127) | 128);
    rest >>= 7;
  }
  return [...bytes, rest & 127];
}

function doubleBytes(x: number): number[] {
  return [...new Uint8Array(Float64Array.of(x).buffer)];
}

/** A local variable or parameter of a function. */
export interface Local {
  readonly get: Code;
  set(value: Code): Code;
}

export const i32 = {
  constant: (n: number): Code => [0x41, ...signed(n)],
  load: (address: Code, offset = 0): Code => [address, 0x28, 2, ...unsigned(offset)],
  add: (a: Code, b: Code): Code => [a, b, 0x6a],
  subtract: (a: Code, b: Code): Code => [a, b, 0x6b],
  multiply: (a: Code, b: Code): Code => [a, b, 0x6c],
  shiftLeft: (a: Code, bits: number): Code => [a, 0x41, bits, 0x74],
  quarter: (a: Code): Code => [a, 0x41, 2, 0x76],
  and: (a: Code, b: Code): Code => [a, b, 0x71],
  /** a < b, unsigned. */
  less: (a: Code, b: Code): Code => [a, b, 0x49],
};

/** One number at a time, or two side by side: the same arithmetic either way, each operation rounded once. */
export interface Arithmetic {
  readonly type: number;
  /** Bytes a value takes. */
  readonly bytes: number;
  constant(x: number): Code;
  load(address: Code, offset: number): Code;
  store(address: Code, value: Code, offset: number): Code;
  subtract(a: Code, b: Code): Code;
  multiply(a: Code, b: Code): Code;
  divide(a: Code, b: Code): Code;
  magnitude(a: Code): Code;
  /** 1 (an i32) when each number of a is at most that of b; 0 when one is not, or is not a number. */
  allAtMost(a: Code, b: Code): Code;
}

const simd = (operation: number): number[] => [0xfd, ...unsigned(operation)];

export const scalar: Arithmetic = {
  type: F64,
  bytes: 8,
  constant: (x) => [0x44, ...doubleBytes(x)],
  load: (address, offset) => [address, 0x2b, 3, ...unsigned(offset)],
  store: (address, value, offset) => [address, value, 0x39, 3, ...unsigned(offset)],
  subtract: (a, b) => [a, b, 0xa1],
  multiply: (a, b) => [a, b, 0xa2],
  divide: (a, b) => [a, b, 0xa3],
  magnitude: (a) => [a, 0x99],
  allAtMost: (a, b) => [a, b, 0x65],
};

export const pair: Arithmetic = {
  type: V128,
  bytes: 16,
  constant: (x) => [...simd(0x0c), ...doubleBytes(x), ...doubleBytes(x)],
  load: (address, offset) => [address, ...simd(0x00), 3, ...unsigned(offset)],
  store: (address, value, offset) => [address, value, ...simd(0x0b), 3, ...unsigned(offset)],
  subtract: (a, b) => [a, b, ...simd(0xf1)],
  multiply: (a, b) => [a, b, ...simd(0xf2)],
  divide: (a, b) => [a, b, ...simd(0xf3)],
  magnitude: (a) => [a, ...simd(0xec)],
  allAtMost: (a, b) => [a, b, ...simd(0x4b), ...simd(0xc3)],
};

/** A pair of the same number twice. */
export const twice = (a: Code): Code => [a, ...simd(0x14)];

/** Stores zero bytes: from, how many. */
export const clear = (from: Code, bytes: Code): Code => [from, 0x41, 0, bytes, 0xfc, 0x0b, 0];

/** Repeats `body` at least once, as long as `again` (an i32 computed after it) is not zero. */
export const repeatWhile = (body: Code, again: Code): Code => [0x03, 0x40, body, again, 0x0d, 0, 0x0b];

/** Runs `body` if `condition` is not zero. */
export const when = (condition: Code, body: Code): Code => [condition, 0x04, 0x40, body, 0x0b];

/** A function under construction. Parameters are 32-bit integers. */
export class FunctionWriter {
  readonly parameters: Local[];
  private readonly types: number[] = [];

  constructor(parameterCount: number) {
    this.parameters = Array.from({ length: parameterCount }, (_, i) => local(i));
  }

  /** A new local variable. */
  local(type: number): Local {
    this.types.push(type);
    return local(this.parameters.length + this.types.length - 1);
  }

  /** The function's entry in the code section. */
  finish(body: Code): number[] {
    const declarations = this.types.flatMap((type) => [1, type]);
    const bytes = [...unsigned(this.types.length), ...declarations];
    layOut(body, bytes);
    bytes.push(0x0b);
    return [...unsigned(bytes.length), ...bytes];
  }
}

function layOut(code: Code, bytes: number[]): void {
  for (const item of code) {
    if (typeof item === 'number') bytes.push(item);
    else layOut(item, bytes);
  }
}

function local(index: number): Local {
  return { get: [0x20, ...unsigned(index)], set: (value) => [value, 0x21, ...unsigned(index)] };
}

/** A finished function: name, number of i32 parameters, entry in the code section. Each returns an i32. */
export interface WrittenFunction {
  readonly name: string;
  readonly parameterCount: number;
  readonly entry: readonly number[];
}

/** A module of these functions, working on the memory imported as host.memory. */
export function writeModule(functions: readonly WrittenFunction[]): Uint8Array {
  const text = (s: string): number[] => [...unsigned(s.length), ...Array.from(s, (c) => c.charCodeAt(0))];
  const section = (id: number, items: readonly (readonly number[])[]): number[] => {
    const body = [...unsigned(items.length), ...items.flat()];
    return [id, ...unsigned(body.length), ...body];
  };
  const types = functions.map((f) => [
    0x60,
    ...unsigned(f.parameterCount),
    ...Array<number>(f.parameterCount).fill(I32),
    1,
    I32,
  ]);
  return Uint8Array.from([
    0x00,
    0x61,
    0x73,
    0x6d,
    1,
    0,
    0,
    0,
    ...section(1, types),
    ...section(2, [[...text('host'), ...text('memory'), 2, 0, 1]]),
    ...section(
      3,
      functions.map((_, i) => unsigned(i)),
    ),
    ...section(
      7,
      functions.map((f, i) => [...text(f.name), 0, ...unsigned(i)]),
    ),
    ...section(
      10,
      functions.map((f) => f.entry),
    ),
  ]);
}
