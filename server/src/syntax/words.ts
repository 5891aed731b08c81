/** Finds the word that was meant: `TPO` is `TOP` with two letters exchanged. */

/** Null where nothing is close enough to be worth suggesting. */
export function closest(word: string, candidates: Iterable<string>): string | null {
  if (longest < word.length) return null;
  let best: string | null = null;
  let bestCost = Infinity;
  for (const candidate of candidates) {
    if (candidate === word) continue;
    const cost = differenceInCase(word, candidate) ? 0.5 : editDistance(word, candidate, Math.min(bestCost, allowance(word)));
    if (cost < bestCost) {
      best = candidate;
      bestCost = cost;
    }
  }
  return best;
}

/** Nothing that a person misspelt is longer, and the cost is quadratic. */
const longest = 64;

/** One mistake in three letters: any more, and a suggestion is a guess. */
function allowance(word: string): number {
  return Math.max(1, Math.floor(word.length / 3));
}

function differenceInCase(word: string, candidate: string): boolean {
  return word.length === candidate.length && word.toLowerCase() === candidate.toLowerCase();
}

/** Insertions, deletions, changes and exchanges of neighbours (optimal string alignment); Infinity over `limit`. */
function editDistance(from: string, to: string, limit: number): number {
  if (limit < Math.abs(from.length - to.length)) return Infinity;
  // A word of one letter is one change away from every other.
  if (from.length === 1 && to.length === 1) return Infinity;
  let beforeLast: number[] = [];
  let last = Array.from({ length: to.length + 1 }, (_, column) => column);
  for (let row = 1; row <= from.length; row += 1) {
    const current = [row];
    for (let column = 1; column <= to.length; column += 1) {
      const same = from[row - 1] === to[column - 1];
      let cost = Math.min(last[column]! + 1, current[column - 1]! + 1, last[column - 1]! + (same ? 0 : 1));
      if (1 < row && 1 < column && from[row - 1] === to[column - 2] && from[row - 2] === to[column - 1]) cost = Math.min(cost, beforeLast[column - 2]! + 1);
      current.push(cost);
    }
    beforeLast = last;
    last = current;
  }
  const distance = last[to.length]!;
  return distance <= limit ? distance : Infinity;
}
