/**
 * Reads JSON text (RFC 8259) into plain values. Unlike the language's own reader it bounds the depth, refuses a field that is
 * given twice in one object and field names that would reach into the program's own objects, and says where and what is wrong
 * in the same words on every host.
 */
import { quoted } from '../units/parsed.ts';
import type { Issue, Result } from './issue.ts';
import { IssueList } from './issueList.ts';
import { fieldPath, itemPath } from './path.ts';

/** Largest job text that is read, in UTF-16 units. */
export const largestTextLength = 64 * 1024 * 1024;
/** A job needs five levels; the rest is for `x-…` fields. */
const deepestLevel = 64;

const forbiddenNames: ReadonlySet<string> = new Set(['__proto__', 'constructor', 'prototype']);

/** True for names that no field, part or junction may carry, since they name the insides of the program's objects. */
export function isForbiddenName(name: string): boolean {
  return forbiddenNames.has(name);
}

/** The value that a JSON text stands for, or all that is wrong with the text. */
export function readJson(text: string): Result<unknown, readonly Issue[]> {
  if (text.length > largestTextLength) {
    const message = `The text is ${String(text.length)} characters long; a job of more than ${String(largestTextLength)} is not read.`;
    return { ok: false, issues: [{ path: '', code: 'too-large', message }] };
  }
  const issues = new IssueList();
  const reader = new JsonReader(text, issues);
  try {
    const value = reader.document();
    return issues.size === 0 ? { ok: true, value } : { ok: false, issues: issues.all() };
  } catch (trouble) {
    if (!(trouble instanceof Unreadable)) throw trouble;
    return { ok: false, issues: [...issues.all(), trouble.issue] };
  }
}

/** Ends the reading at the first place where the text is no JSON; never leaves this file. */
class Unreadable extends Error {
  readonly issue: Issue;
  constructor(issue: Issue) {
    super(issue.message);
    this.issue = issue;
  }
}

// Bounded repeats: an unbounded one over millions of digits would exhaust the pattern matcher's own stack.
const numberPattern = /-?(?:0|[1-9]\d{0,400})(?:\.\d{1,400})?(?:[eE][+-]?\d{1,20})?/y;
const wordPattern = /[^\s,:{}[\]"]{1,30}/y;
const needsCare = /[\\\p{Cc}]/u;
const escapePattern = /^(?:["\\/bfnrt]|u[0-9A-Fa-f]{4})/;
const escapes: Readonly<Record<string, string>> = { b: '\b', f: '\f', n: '\n', r: '\r', t: '\t' };

class JsonReader {
  private at = 0;
  private readonly text: string;
  private readonly issues: IssueList;

  constructor(text: string, issues: IssueList) {
    this.text = text;
    this.issues = issues;
  }

  document(): unknown {
    if (this.text.charCodeAt(0) === 0xfeff) this.at = 1; // a byte order mark says nothing about the job
    this.skipSpace();
    if (this.at >= this.text.length) this.fail('the text is empty');
    const value = this.value('', 0);
    this.skipSpace();
    if (this.at < this.text.length) this.fail(`expected the end of the text after the job, found ${this.found()}`);
    return value;
  }

  private value(path: string, level: number): unknown {
    switch (this.text[this.at]) {
      case '{':
        return this.object(path, level + 1);
      case '[':
        return this.list(path, level + 1);
      case '"':
        return this.string();
      default:
        return this.numberOrWord();
    }
  }

  private object(path: string, level: number): unknown {
    this.enter(path, level);
    const fields: Record<string, unknown> = {};
    this.skipSpace();
    if (this.take('}')) return fields;
    for (;;) {
      this.skipSpace();
      if (this.text[this.at] !== '"') this.fail(`expected a field name in double quotes, found ${this.found()}`);
      const name = this.string();
      const valuePath = fieldPath(path, name);
      this.skipSpace();
      if (!this.take(':')) this.fail(`expected ":" after the field name ${quoted(name)}, found ${this.found()}`);
      this.skipSpace();
      const value = this.value(valuePath, level);
      if (this.mayKeep(fields, name, valuePath)) fields[name] = value;
      this.skipSpace();
      if (this.take('}')) return fields;
      if (!this.take(',')) this.fail(`expected "," or "}" after a field, found ${this.found()}`);
    }
  }

  private mayKeep(fields: object, name: string, path: string): boolean {
    if (isForbiddenName(name)) {
      this.issues.add(path, 'forbidden-field', () => `A field of a job cannot be called ${quoted(name)}.`);
      return false;
    }
    if (Object.hasOwn(fields, name)) {
      this.issues.add(path, 'duplicate-field', () => 'This field is given twice in one object; which one counts?');
      return false;
    }
    return true;
  }

  private list(path: string, level: number): unknown {
    this.enter(path, level);
    const items: unknown[] = [];
    this.skipSpace();
    if (this.take(']')) return items;
    for (;;) {
      this.skipSpace();
      items.push(this.value(itemPath(path, items.length), level));
      this.skipSpace();
      if (this.take(']')) return items;
      if (!this.take(',')) this.fail(`expected "," or "]" after an item of a list, found ${this.found()}`);
    }
  }

  private enter(path: string, level: number): void {
    if (level > deepestLevel) {
      const message = `Lists and objects are nested more than ${String(deepestLevel)} levels deep here (${this.place()}).`;
      throw new Unreadable({ path: path.length > 200 ? `${path.slice(0, 200)}…` : path, code: 'too-deep', message });
    }
    this.at += 1;
  }

  private string(): string {
    const end = this.text.indexOf('"', this.at + 1);
    const content = this.text.slice(this.at + 1, Math.max(end, this.at + 1));
    if (end < 0 || needsCare.test(content)) return this.stringWithEscapes();
    this.at = end + 1;
    return content;
  }

  private stringWithEscapes(): string {
    const start = this.at;
    const pieces: string[] = [];
    let from = start + 1;
    for (let i = from; i < this.text.length; i += 1) {
      const code = this.text.charCodeAt(i);
      if (code === 0x22) {
        this.at = i + 1;
        return pieces.join('') + this.text.slice(from, i);
      }
      if (code < 0x20) {
        this.at = i;
        this.fail(
          'a text runs over the end of the line or holds a control character: a closing quote is missing, or write it as \\n',
        );
      }
      if (code !== 0x5c) continue;
      const sign = escapePattern.exec(this.text.slice(i + 1, i + 6))?.[0];
      if (sign === undefined) {
        this.at = i;
        this.fail('a backslash in a text must be followed by one of " \\ / b f n r t or u and four hexadecimal digits');
      }
      pieces.push(this.text.slice(from, i), unescaped(sign));
      i += sign.length;
      from = i + 1;
    }
    this.at = start;
    return this.fail('the text that begins here has no closing quote');
  }

  private numberOrWord(): unknown {
    wordPattern.lastIndex = this.at;
    const word = wordPattern.exec(this.text)?.[0] ?? '';
    if (word === 'true') return this.skip(word, true);
    if (word === 'false') return this.skip(word, false);
    if (word === 'null') return this.skip(word, null);
    if (/^[+-]?(?:nan|inf)/i.test(word)) this.fail(`${word} is no number that a job can hold`);
    numberPattern.lastIndex = this.at;
    const number = numberPattern.exec(this.text)?.[0];
    if (number === undefined) return this.fail(`expected a value, found ${this.found()}`);
    const next = this.text[this.at + number.length];
    if (next !== undefined && !/[\s,\]}:]/.test(next)) this.fail(`expected a number, found ${quoted(word)}`);
    return this.skip(number, Number(number));
  }

  private skip(word: string, value: unknown): unknown {
    this.at += word.length;
    return value;
  }

  private skipSpace(): void {
    for (;;) {
      const code = this.text.charCodeAt(this.at);
      if (code !== 0x20 && code !== 0x0a && code !== 0x0d && code !== 0x09) return;
      this.at += 1;
    }
  }

  private take(sign: string): boolean {
    if (this.text[this.at] !== sign) return false;
    this.at += 1;
    return true;
  }

  private found(): string {
    if (this.at >= this.text.length) return 'the end of the text';
    wordPattern.lastIndex = this.at;
    return JSON.stringify(wordPattern.exec(this.text)?.[0] ?? this.text[this.at]);
  }

  private place(): string {
    const before = this.text.slice(0, this.at);
    let line = 1;
    for (let i = before.indexOf('\n'); i >= 0; i = before.indexOf('\n', i + 1)) line += 1;
    return `line ${String(line)}, column ${String(this.at - before.lastIndexOf('\n'))}`;
  }

  private fail(what: string): never {
    throw new Unreadable({ path: '', code: 'not-json', message: `This is not JSON: ${what} (${this.place()}).` });
  }
}

function unescaped(sign: string): string {
  if (sign.startsWith('u')) return String.fromCharCode(Number.parseInt(sign.slice(1), 16));
  return escapes[sign] ?? sign;
}
