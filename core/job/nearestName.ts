/** The name that a misspelt one was probably meant to be. */

const mostCandidates = 5000;
const longestName = 60;

/** A hint for the end of a message, ` (did you mean lengthM?)`, or nothing where no candidate is near. */
export function nearestNameHint(written: string, candidates: Iterable<string>): string {
  if (written.length > longestName) return '';
  const most = Math.max(1, Math.floor(written.length / 3));
  let best: string | undefined;
  let bestDistance = most + 1;
  let seen = 0;
  for (const candidate of candidates) {
    seen += 1;
    if (seen > mostCandidates) break;
    if (Math.abs(candidate.length - written.length) >= bestDistance) continue;
    // Of names that are equally near, the one that begins alike is the likelier.
    const distance =
      editDistance(written.toLowerCase(), candidate.toLowerCase()) - (written[0] === candidate[0] ? 0.5 : 0);
    if (distance < bestDistance) [best, bestDistance] = [candidate, distance];
  }
  return best === undefined ? '' : ` (did you mean ${best}?)`;
}

/** Insertions, deletions and replacements between two words (Levenshtein 1966), a swap of neighbours counting as one. */
function editDistance(a: string, b: string): number {
  let beforeLast: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i += 1) {
    const row = [i];
    for (let j = 1; j <= b.length; j += 1) {
      const replaced = at(last, j - 1) + (a[i - 1] === b[j - 1] ? 0 : 1);
      let least = Math.min(replaced, at(last, j) + 1, at(row, j - 1) + 1);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) {
        least = Math.min(least, at(beforeLast, j - 2) + 1);
      }
      row.push(least);
    }
    [beforeLast, last] = [last, row];
  }
  return at(last, b.length);
}

function at(row: readonly number[], index: number): number {
  return row[index] ?? Number.POSITIVE_INFINITY;
}
