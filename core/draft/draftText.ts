/** The text of a job file, written the same way every time so that a person can read it and a text tool compare it. */
import { topFields } from '../job/jobFields.ts';
import type { Draft } from './draft.ts';

/** Lines are broken before this column; a single text that is longer stays whole. */
const widest = 148;
/** Top-level fields whose items stand on lines of their own. */
const lists: ReadonlySet<string> = new Set(['parts', 'cases', 'demand', 'readings']);

/** The job as text: fields of the head in the order of the contract, one part to a line or to a few. Parses to an equal value. */
export function draftText(draft: Draft): string {
  const known = Object.keys(topFields).filter((name) => draft[name] !== undefined);
  const others = Object.keys(draft).filter((name) => !Object.hasOwn(topFields, name) && draft[name] !== undefined);
  const fields = [...known, ...others].map((name) => `  ${JSON.stringify(name)}: ${block(name, draft[name])}`);
  return `{\n${fields.join(',\n')}\n}\n`;
}

function block(name: string, value: unknown): string {
  const indent = '    ';
  if (lists.has(name) && Array.isArray(value) && value.length > 0) {
    return `[\n${value.map((item: unknown) => indent + wrapped(item, indent.length)).join(',\n')}\n  ]`;
  }
  const start = JSON.stringify(name).length + 4;
  if (name === 'junctions' && plain(value).length + start > widest) {
    return `{\n${indent}${filled(entriesOf(value), indent.length, indent)}\n  }`;
  }
  return wrapped(value, 2, start);
}

/** A value on one line, or its fields filled into lines that are indented below it. */
function wrapped(value: unknown, indent: number, start = indent): string {
  const line = plain(value);
  if (line.length + start <= widest || typeof value !== 'object' || value === null) return line;
  const inner = ' '.repeat(indent + 2);
  const [open, close] = Array.isArray(value) ? ['[', ']'] : ['{ ', ' }'];
  return open + filled(entriesOf(value), start + open.length, inner) + close;
}

interface Entry {
  readonly head: string;
  readonly value: unknown;
}

function entriesOf(value: unknown): readonly Entry[] {
  if (Array.isArray(value)) return value.map((item: unknown) => ({ head: '', value: item }));
  return Object.entries(value as object)
    .filter(([, item]) => item !== undefined)
    .map(([name, item]) => ({ head: `${JSON.stringify(name)}: `, value: item as unknown }));
}

/** As many entries to a line as fit; an entry too long for a line of its own is broken in turn. */
function filled(entries: readonly Entry[], start: number, indent: string): string {
  let text = '';
  let column = start;
  entries.forEach(({ head, value }, index) => {
    const last = index === entries.length - 1;
    const line = head + plain(value);
    const room = widest - 2;
    if (index > 0 && column + line.length + 1 > room) {
      text = `${text.trimEnd()}\n${indent}`;
      column = indent.length;
    }
    const fits = column + line.length <= room;
    const written = fits ? line : head + wrapped(value, indent.length, column + head.length);
    text += written + (last ? '' : ', ');
    const end = written.lastIndexOf('\n');
    column = end < 0 ? column + written.length + 2 : written.length - end + 1;
  });
  return text;
}

/** One line, with a space inside the braces of objects and after every comma. */
function plain(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map((item: unknown) => plain(item)).join(', ')}]`;
  if (typeof value !== 'object' || value === null) return JSON.stringify(value);
  const fields = entriesOf(value).map(({ head, value: item }) => head + plain(item));
  return fields.length === 0 ? '{}' : `{ ${fields.join(', ')} }`;
}
