import leven from "leven";

/**
 * The candidate that a mistyped word most likely means, or undefined when none is close. Case, spaces, hyphens and
 * underscores do not count; swapped letters count for little, and so does an ending left out or added to four letters or more.
 *
 * @param word what was written
 * @param candidates what could have been meant, the likelier first
 */
export function nearest(word: string, candidates: readonly string[]): string | undefined {
  let best: string | undefined;
  let least = Infinity;
  for (const candidate of candidates) {
    const distance = distanceBetween(plain(word), plain(candidate));
    if (distance < least) {
      best = candidate;
      least = distance;
    }
  }
  return best;
}

/** Infinity for words that have too little in common to be mistaken for one another. */
function distanceBetween(word: string, candidate: string): number {
  if (word === candidate) return 0;
  if (word.length === candidate.length && lettersOf(word) === lettersOf(candidate)) return 0.5;
  const shorter = Math.min(word.length, candidate.length);
  if (shorter >= 4 && (word.startsWith(candidate) || candidate.startsWith(word))) return 0.75;
  // Tuned against the misspellings in tests/design: a third of the letters, but one in words of three and two in longer ones.
  const allowed = Math.max(candidate.length <= 3 ? 1 : 2, Math.floor(candidate.length / 3));
  const distance = leven(word, candidate);
  return distance <= allowed && distance < Math.max(word.length, candidate.length) ? distance : Infinity;
}

const plain = (word: string): string => word.toLowerCase().replace(/[\s_-]/g, "");

const lettersOf = (word: string): string => [...word].sort().join("");
