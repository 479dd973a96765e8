/** Answers as JSON text: maps as plain objects, and never a number that JSON would turn into `null` unseen. */
import { Defect } from '../../core/api.ts';

/** One JSON document with a line end. */
export function jsonText(value: unknown): string {
  return `${JSON.stringify(value, checkedValue, 2)}\n`;
}

function checkedValue(this: unknown, key: string, value: unknown): unknown {
  if (typeof value === 'number' && !Number.isFinite(value))
    throw new Defect(`every answered number is finite (${key})`);
  if (value instanceof Map) return plainObject(value as ReadonlyMap<string, unknown>);
  return value;
}

/** An object keyed by ids, without a prototype, so that no id can reach anything but itself. */
export function plainObject<T>(map: ReadonlyMap<string, T>): Record<string, T> {
  const object = Object.create(null) as Record<string, T>;
  for (const [key, value] of map) object[key] = value;
  return object;
}
