/**
 * The words nearest to a mistyped one, best first, at most `most`: within a third of its length (at least two) in edits
 * (optimal string alignment), or beginning with it; case does not count.
 */
export function nearest(word: string, known: Iterable<string>, most = 3): string[] {
  const sought = word.toLowerCase();
  const reach = Math.max(2, Math.floor(sought.length / 3));
  const found: { candidate: string; distance: number }[] = [];
  for (const candidate of new Set(known)) {
    const lower = candidate.toLowerCase();
    if (Math.abs(lower.length - sought.length) > reach && !lower.startsWith(sought)) continue;
    const distance = lower.startsWith(sought) && sought.length > 1 ? 0.5 : edits(sought, lower);
    if (distance <= reach && distance < Math.max(sought.length, lower.length)) found.push({ candidate, distance });
  }
  found.sort((a, b) => a.distance - b.distance || (a.candidate < b.candidate ? -1 : 1));
  return found.slice(0, most).map(({ candidate }) => candidate);
}

/** `; nearest: lead, leads`, or '' when nothing is near. */
export function nearestWords(word: string, known: Iterable<string>): string {
  const near = nearest(word, known);
  return near.length === 0 ? '' : `; nearest: ${near.join(', ')}`;
}

function edits(a: string, b: string): number {
  let before: number[] = [];
  let previous = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const cost = a[i - 1] === b[j - 1] ? 0 : 1;
      let best = Math.min(previous[j]! + 1, row[j - 1]! + 1, previous[j - 1]! + cost);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) best = Math.min(best, before[j - 2]! + 1);
      row.push(best);
    }
    before = previous;
    previous = row;
  }
  return previous[b.length]!;
}
