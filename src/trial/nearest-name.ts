/**
 * The candidates that `name` was probably meant to be, nearest first: same name in other letter case, or few letters
 * away (Levenshtein distance, at most a third of the length).
 */
export function nearNames(name: string, candidates: readonly string[]): string[] {
  const wanted = fold(name);
  return candidates
    .map((candidate) => ({ candidate, away: levenshtein(wanted, fold(candidate)) }))
    .filter(({ candidate, away }) => away <= Math.max(1, Math.floor(Math.min(wanted.length, candidate.length) / 3)))
    .sort((a, b) => a.away - b.away || (a.candidate < b.candidate ? -1 : 1))
    .map(({ candidate }) => candidate);
}

function fold(name: string): string {
  return name.normalize("NFC").toLowerCase().replaceAll("-", "_");
}

/** Fewest single-letter insertions, deletions and changes from `a` to `b` (Levenshtein 1966). */
export function levenshtein(a: string, b: string): number {
  let above = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const change = above[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1);
      row.push(Math.min(change, above[j]! + 1, row[j - 1]! + 1));
    }
    above = row;
  }
  return above[b.length]!;
}
