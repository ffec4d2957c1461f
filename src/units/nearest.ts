import leven from "leven";

const plain = (word: string): string => word.toLowerCase().replace(/[\s_-]/g, "");

/**
 * The candidate that a mistyped word most likely means, or undefined when none is close. Case, spaces, hyphens and
 * underscores count for little; an abbreviation of four letters or more counts as close.
 *
 * @param word what was written
 * @param candidates what could have been meant, the likelier first
 */
export function nearest(word: string, candidates: readonly string[]): string | undefined {
  let best: string | undefined;
  let least = Infinity;
  for (const candidate of candidates) {
    const a = plain(word);
    const b = plain(candidate);
    const begins = Math.min(a.length, b.length) >= 4 && (a.startsWith(b) || b.startsWith(a));
    const distance = begins ? 0.75 : leven(a, b) + (word === candidate ? 0 : 0.25 * Number(a !== b));
    // Tuned against the misspellings in tests/design: a third of the letters, two at most in short words.
    const allowed = Math.max(b.length <= 3 ? 1 : 2, Math.floor(b.length / 3)) + 0.25;
    if (distance <= allowed && distance < least && distance < Math.max(a.length, b.length)) {
      best = candidate;
      least = distance;
    }
  }
  return best;
}
