/** Where a part touches junctions, and by what name each terminal is called on a screen. */
import { isRawObject } from '../job/field.ts';
import type { OpenPart, RawPart } from './draft.ts';

/** One end of a part. Paths: `plus`, `minus`, `from`, `to`, `from.plus` … `to.minus`, `midpoint`, `junctions[0]` … */
export interface Terminal {
  readonly path: string;
  readonly junction: string;
  /** Which pole of a source, a load or a port this is. */
  readonly pole?: 'plus' | 'minus';
}

/** How the kinds touch: two poles, two ends, two ports of two poles each, or a row of taps. */
export type Touch = 'poles' | 'ends' | 'ports' | 'taps';

export function touchOf(kind: string): Touch {
  switch (kind) {
    case 'busbar':
      return 'taps';
    case 'pair':
    case 'controller':
    case 'converter':
      return 'ports';
    case 'string':
    case 'load':
    case 'inverter':
    case 'array':
    case 'charger':
      return 'poles';
    default:
      return 'ends';
  }
}

/** The terminal paths that every part of the kind has; a bar begins with two taps. */
export function pathsOf(kind: string): readonly string[] {
  switch (touchOf(kind)) {
    case 'taps':
      return ['junctions[0]', 'junctions[1]'];
    case 'ports':
      return ['from.plus', 'from.minus', 'to.plus', 'to.minus'];
    case 'poles':
      return ['plus', 'minus'];
    case 'ends':
      return ['from', 'to'];
  }
}

/** Every terminal of a part of the file, in the order of its fields. */
export function terminalsOf(part: RawPart): readonly Terminal[] {
  if (touchOf(part.kind) === 'taps') {
    const taps = Array.isArray(part['junctions']) ? (part['junctions'] as readonly unknown[]) : [];
    return taps.flatMap((junction, index) =>
      typeof junction === 'string' ? [{ path: `junctions[${String(index)}]`, junction }] : [],
    );
  }
  const paths = part['midpoint'] === undefined ? pathsOf(part.kind) : [...pathsOf(part.kind), 'midpoint'];
  return paths.flatMap((path) => {
    const junction = junctionAt(part, path);
    if (junction === undefined) return [];
    const pole = path.endsWith('plus') ? 'plus' : path.endsWith('minus') ? 'minus' : undefined;
    return [pole === undefined ? { path, junction } : { path, junction, pole }];
  });
}

/** The junction that a terminal is at; `undefined` where the part has no such terminal. */
export function junctionAt(part: RawPart, path: string): string | undefined {
  const step = stepOf(path);
  const holder = step.holder === undefined ? part : part[step.holder];
  const value = Array.isArray(holder)
    ? (holder as readonly unknown[])[Number(step.field)]
    : isRawObject(holder)
      ? holder[step.field]
      : undefined;
  return typeof value === 'string' ? value : undefined;
}

/** Puts a terminal of an open part at a junction. */
export function putTerminal(part: OpenPart, path: string, junction: string): void {
  const { holder, field } = stepOf(path);
  if (holder === undefined) part[field] = junction;
  else if (holder === 'junctions') {
    const taps = (part['junctions'] ?? []) as string[];
    part['junctions'] = taps;
    taps[Number(field)] = junction;
  } else {
    const port = (part[holder] ?? {}) as Record<string, string>;
    part[holder] = port;
    port[field] = junction;
  }
}

/** True for a path that names a terminal of some kind of part. */
export function isTerminalPath(path: string): boolean {
  return /^(?:plus|minus|from|to|midpoint|(?:from|to)\.(?:plus|minus)|junctions\[\d{1,3}\])$/.test(path);
}

function stepOf(path: string): { readonly holder: string | undefined; readonly field: string } {
  const [, port, pole] = /^(from|to)\.(plus|minus)$/.exec(path) ?? [];
  if (port !== undefined && pole !== undefined) return { holder: port, field: pole };
  const tap = /^junctions\[(\d{1,3})\]$/.exec(path)?.[1];
  return tap === undefined ? { holder: undefined, field: path } : { holder: 'junctions', field: tap };
}

/** The terminal path in words: `from plus`, `tap 2`. */
export function terminalWords(path: string): string {
  const tap = /^junctions\[(\d{1,3})\]$/.exec(path)?.[1];
  return tap === undefined ? path.replace('.', ' ') : `tap ${String(Number(tap) + 1)}`;
}
