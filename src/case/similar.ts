/** Nearest of some names, for "did you mean". */

/** Letters that may differ, per length of the name. */
const FORGIVEN_SHARE = 0.34;

/** The candidate nearest to what was written, when it is near enough to be meant. */
export function nearest(written: string, candidates: Iterable<string>): string | undefined {
  let best: string | undefined;
  let bestDistance = Math.max(1, Math.floor(written.length * FORGIVEN_SHARE)) + 1;
  for (const candidate of candidates) {
    const distance = editDistance(written.toLowerCase(), candidate.toLowerCase());
    if (distance < bestDistance) [best, bestDistance] = [candidate, distance];
  }
  return best;
}

/** "steel", "mould" or "core": names for a message, at most eight of them. */
export function listed(names: Iterable<string>): string {
  const all = [...names];
  const shown = all.slice(0, 8).map((name) => `"${name}"`);
  if (all.length > 8) return `${shown.join(", ")} and ${all.length - 8} more`;
  return shown.length < 2 ? shown.join("") : `${shown.slice(0, -1).join(", ")} or ${shown[shown.length - 1]}`;
}

/** Insertions, deletions, replacements and swaps of neighbours that turn one word into the other. */
function editDistance(a: string, b: string): number {
  const rows = Array.from({ length: a.length + 1 }, (_, i) => [i]);
  rows[0] = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1];
      let least = Math.min(rows[i - 1]![j]! + 1, rows[i]![j - 1]! + 1, rows[i - 1]![j - 1]! + (same ? 0 : 1));
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) {
        least = Math.min(least, rows[i - 2]![j - 2]! + 1);
      }
      rows[i]![j] = least;
    }
  }
  return rows[a.length]![b.length]!;
}
