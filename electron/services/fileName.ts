/** Names of files out of titles of jobs. */

/** Names that a system of ours keeps for devices. */
const kept = /^(?:con|prn|aux|nul|com\d|lpt\d)$/i;
const longest = 80;

/** A title as the beginning of a file name that every system takes; `job` where nothing of it is left. */
export function fileStem(title: string): string {
  const plain = title
    .normalize('NFC')
    .replaceAll(/[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}]/gu, '')
    .replaceAll(/[/\\:*?"<>|]+/g, '-')
    .replaceAll(/\s+/g, ' ');
  const short = Array.from(plain)
    .slice(0, longest)
    .join('')
    .replaceAll(/^[\s.~-]+|[\s.-]+$/g, '');
  return short === '' || kept.test(short) ? 'job' : short;
}

/** The last part of a path of any system. */
export function bareName(path: string): string {
  return path.split(/[/\\]/).at(-1) ?? '';
}
