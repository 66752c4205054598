/**
 * The words nearest to a mistyped one, best first: those within a third of its length (at least two) in edits, or that
 * begin with it. Edits count insertion, deletion, substitution and the exchange of two neighbours (optimal string alignment).
 */
export function nearest(word: string, known: Iterable<string>, most = 3): string[] {
  const sought = word.toLowerCase();
  const reach = Math.max(2, Math.floor(sought.length / 3));
  return [...known]
    .map((candidate) => {
      const lower = candidate.toLowerCase();
      const starts = sought.length > 1 && lower.startsWith(sought);
      return { candidate, distance: starts ? 0.5 : edits(sought, lower) };
    })
    .filter(({ distance }) => distance <= reach)
    .sort((a, b) => a.distance - b.distance || (a.candidate < b.candidate ? -1 : 1))
    .slice(0, most)
    .map(({ candidate }) => candidate);
}

/** `Did you mean lead?`, or '' when nothing is near. */
export function didYouMean(word: string, known: Iterable<string>): string {
  const near = nearest(word, known);
  if (near.length === 0) return '';
  return `Did you mean ${near.length === 1 ? near[0] : `${near.slice(0, -1).join(', ')} or ${near.at(-1)}`}?`;
}

function edits(a: string, b: string): number {
  let before: number[] = [];
  let previous = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1];
      let best = Math.min(previous[j]! + 1, row[j - 1]! + 1, previous[j - 1]! + (same ? 0 : 1));
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) best = Math.min(best, before[j - 2]! + 1);
      row.push(best);
    }
    before = previous;
    previous = row;
  }
  return previous[b.length]!;
}
