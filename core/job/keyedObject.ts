/** Objects whose field names mean something: ids of parts, names of fields. */
import { described, isRawObject, type Place, type RawObject } from './field.ts';
import { fieldPath } from './path.ts';

/** The object under `field` with its path; `undefined` where there is none, with an issue where it is something else. */
export function keyedObject(
  raw: unknown,
  field: string,
  keys: string,
  place: Place,
): { readonly raw: RawObject; readonly path: string } | undefined {
  if (raw === undefined) return undefined;
  const path = fieldPath(place.path, field);
  if (isRawObject(raw)) return { raw, path };
  const message = () => `${field} of ${place.owner} must be an object keyed by ${keys}, got ${described(raw)}.`;
  place.issues.add(path, 'wrong-type', message);
  return undefined;
}
