/** Paths in a job file as they are printed: `parts[3].lengthM`, `cases[0].set["F 3"].state`. */

/** The path of a field of the object at `path`. */
export function fieldPath(path: string, field: string): string {
  if (/^[A-Za-z_][A-Za-z0-9_-]{0,99}$/.test(field)) return path === '' ? field : `${path}.${field}`;
  const short = field.length > 60 ? `${field.slice(0, 60)}…` : field;
  return `${path}[${JSON.stringify(short)}]`;
}

/** The path of an item of the list at `path`. */
export function itemPath(path: string, index: number): string {
  return `${path}[${String(index)}]`;
}
