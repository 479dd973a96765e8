/** What reading a text gives: a value, or words for what was wrong with the text. */

/** A value read from text, or a part of a sentence, `expected …, got …` that says what could not be read. */
export type Parsed<T> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly message: string };

/** A piece of the user's own text for a message: short, in quotes, control signs made visible. */
export function quoted(text: string): string {
  const short = text.length > 40 ? `${text.slice(0, 40).replace(/[\ud800-\udbff]$/, '')}…` : text;
  return JSON.stringify(short).replace(/[\u007f-\u009f\u200b-\u200f\u2028-\u202e\u2060-\u206f\ufeff]/g, escapeSign);
}

function escapeSign(sign: string): string {
  return `\\u${sign.charCodeAt(0).toString(16).padStart(4, '0')}`;
}
