/** Which texts may name a part, a case, a reading or a junction, and which texts may be printed. */
import { isForbiddenName } from './readJson.ts';

const longestName = 100;

/** What is wrong with the id of a part, case or reading (`[A-Za-z0-9 _.+-]`), as the rest of a sentence; `undefined` if nothing. */
export function troubleWithId(id: string): string | undefined {
  if (id === '') return 'must not be empty';
  if (!/^[A-Za-z0-9 _.+-]+$/.test(id))
    return 'may hold only the letters A to Z and a to z, digits, spaces and the signs _ . + -';
  return troubleWithAnyName(id);
}

/**
 * What is wrong with the name of a junction; `undefined` if nothing. Letters of every script are allowed, but no signs that cannot
 * be seen: two names that look alike and are not the same would part a joint without a trace.
 */
export function troubleWithJunction(name: string): string | undefined {
  if (name === '') return 'must not be empty';
  if (name.length > longestName) return troubleWithAnyName(name);
  if (/^[ -~]+$/.test(name)) return troubleWithAnyName(name); // plain letters and signs cannot be mistaken
  if (/[\p{C}\p{Zl}\p{Zp}]/u.test(name)) return 'must not hold control signs or other signs that cannot be seen';
  if (name.normalize('NFC') !== name)
    return 'must be written with composed letters (Unicode form NFC), else two names may look alike';
  return troubleWithAnyName(name);
}

function troubleWithAnyName(name: string): string | undefined {
  if (name.length > longestName) return `must not be longer than ${String(longestName)} characters`;
  if (name.trim() !== name) return 'must not begin or end with a space';
  if (isForbiddenName(name)) return 'is a reserved word; choose another name';
  return undefined;
}

/** What is wrong with a text that is to be printed; `undefined` if nothing. Line ends and tabs are allowed. */
export function troubleWithText(text: string, longest: number): string | undefined {
  if (text.length > longest) return `must not be longer than ${String(longest)} characters`;
  if (/\p{Surrogate}/u.test(text)) return 'must be whole Unicode characters; half of a pair stands alone';
  if (/[^\P{Cc}\n\r\t]/u.test(text)) return 'must not hold control characters';
  if (/[\u202d\u202e]/.test(text)) return 'must not hold signs that turn the direction of the text around';
  return undefined;
}
