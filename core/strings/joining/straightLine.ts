/** A figure that runs in straight stretches, flat beyond its ends. */

export interface LinePoint {
  readonly x: number;
  readonly y: number;
}

/** Points that rise strictly in x; one at least. */
export type StraightLine = readonly LinePoint[];

export function valueAt(line: StraightLine, x: number): number {
  const index = line.findIndex((point) => point.x >= x);
  if (index === 0) return line[0]!.y;
  if (index < 0) return line.at(-1)!.y;
  const from = line[index - 1]!;
  const to = line[index]!;
  return from.y + ((to.y - from.y) * (x - from.x)) / (to.x - from.x);
}

/** Where a line that never falls first reaches `y`; its ends are not passed. */
export function firstAt(line: StraightLine, y: number): number {
  const index = line.findIndex((point) => point.y >= y);
  if (index === 0) return line[0]!.x;
  if (index < 0) return line.at(-1)!.x;
  const from = line[index - 1]!;
  const to = line[index]!;
  return from.x + ((to.x - from.x) * (y - from.y)) / (to.y - from.y);
}

/** One line as a part of a sum: `weight` times its value at `rate` times x. */
export interface LinePart {
  readonly line: StraightLine;
  readonly weight: number;
  /** Not 0; negative where the line is run through backwards. */
  readonly rate: number;
}

/** Sum of weight x line(rate x), with a point wherever one of its parts has one. */
export function sumOfLines(parts: readonly LinePart[]): StraightLine {
  const places = [...new Set(parts.flatMap(({ line, rate }) => line.map(({ x }) => x / rate)))];
  places.sort((one, other) => one - other);
  return places.map((x) => ({
    x,
    y: parts.reduce((sum, { line, weight, rate }) => sum + weight * valueAt(line, rate * x), 0),
  }));
}
