import { describe, expect, it } from "vitest";
import { NYSTROM_4, NYSTROM_6, type Splitting, STRANG, splittings } from "../../src/steppers/splittings.js";

/** Coefficients of the words in A and B, up to a length, of a product of exponentials of two operators that do not commute. */
type Words = Map<string, number>;

const letters = ["A", "B"] as const;
const wordsOf = (length: number): string[] =>
  length === 0 ? [""] : wordsOf(length - 1).flatMap((word) => letters.map((letter) => word + letter));

/** words * exp(c X): of a word that ends in k or more X, c^k / k! of what stands before them. */
function timesExponential(words: Words, letter: string, c: number, length: number): Words {
  const product: Words = new Map();
  for (let l = 0; l <= length; l++)
    for (const word of wordsOf(l)) {
      let sum = 0;
      let factor = 1;
      for (let k = 0; k <= l; k++) {
        if (k > 0) {
          if (word[l - k] !== letter) break;
          factor *= c / k;
        }
        sum += factor * (words.get(word.slice(0, l - k)) ?? 0);
      }
      product.set(word, sum);
    }
  return product;
}

function wordsOfSplitting({ a, b }: Splitting, length: number): Words {
  let words: Words = new Map([["", 1]]);
  b.forEach((coefficient, stage) => {
    words = timesExponential(words, "B", coefficient, length);
    if (stage < a.length) words = timesExponential(words, "A", a[stage], length);
  });
  return words;
}

const factorial = (n: number): number => (n < 2 ? 1 : n * factorial(n - 1));
const count = (word: string, letter: string) => word.split(letter).length - 1;

/** Greatest |coefficient - 1/L!| over the words of the given lengths that `pick` takes: exp(A + B) has 1/L! at each. */
function worst(splitting: Splitting, lengths: readonly number[], pick = (_word: string) => true): number {
  const words = wordsOfSplitting(splitting, Math.max(...lengths));
  return Math.max(
    ...lengths.flatMap((length) =>
      wordsOf(length)
        .filter(pick)
        .map((word) => Math.abs((words.get(word) as number) - 1 / factorial(length))),
    ),
  );
}

const upTo = (length: number) => Array.from({ length }, (_, i) => i + 1);
/** The coefficients are given with 15 digits; a word of up to six letters adds up a few roundings. Measured: 2e-16. */
const ROUND_OFF = 2e-15;
/** [B, [B, [B, A]]] and all that is made of it holds three letters B or more. */
const fewB = (word: string) => count(word, "B") <= 2;

type Free = Map<string, number>;
const product = (x: Free, y: Free): Free => {
  const out: Free = new Map();
  for (const [u, a] of x) for (const [v, b] of y) out.set(u + v, (out.get(u + v) ?? 0) + a * b);
  return out;
};
const commutator = (x: Free, y: Free): Free => {
  const out = product(x, y);
  for (const [word, value] of product(y, x)) out.set(word, (out.get(word) ?? 0) - value);
  return out;
};
const A: Free = new Map([["A", 1]]);
const B: Free = new Map([["B", 1]]);

describe("splitting coefficients against the series of exp(A + B) (order conditions by words; computed here)", () => {
  it.each([STRANG, NYSTROM_4])("order $order: all words up to that length", (splitting) => {
    expect(worst(splitting, upTo(splitting.order))).toBeLessThan(ROUND_OFF);
    expect(worst(splitting, [splitting.order + 1])).toBeGreaterThan(1e-7);
  });

  it("order 6: all words up to length 4, and those of length 5 and 6 that do not touch [B, [B, [B, A]]]", () => {
    expect(worst(NYSTROM_6, upTo(4))).toBeLessThan(ROUND_OFF);
    expect(worst(NYSTROM_6, [5, 6], fewB)).toBeLessThan(ROUND_OFF);
  });

  it("order 6: words of length 5 differ by 1.5e-5, all of it along [A, c] and [B, c] with c = [B, [B, [B, A]]] = 0", () => {
    const words = wordsOfSplitting(NYSTROM_6, 5);
    const difference = (word: string) => (words.get(word) as number) - 1 / factorial(5);
    const c = commutator(B, commutator(B, commutator(B, A)));
    const alongA = commutator(A, c);
    const alongB = commutator(B, c);
    // AABBB occurs in the first alone, ABBBB in the second alone.
    const x = difference("AABBB") / (alongA.get("AABBB") as number);
    const y = difference("ABBBB") / (alongB.get("ABBBB") as number);
    expect(alongA.get("ABBBB") ?? 0).toBe(0);
    expect(alongB.get("AABBB") ?? 0).toBe(0);
    const left = wordsOf(5).map((word) =>
      Math.abs(difference(word) - x * (alongA.get(word) ?? 0) - y * (alongB.get(word) ?? 0)),
    );
    expect(Math.max(...left)).toBeLessThan(ROUND_OFF);
    const greatest = Math.max(...wordsOf(5).map((word) => Math.abs(difference(word))));
    expect(greatest / 1.5e-5).toBeGreaterThan(0.9);
    expect(greatest / 1.5e-5).toBeLessThan(1.1);
  });

  it.each(splittings)("order $order: mirrored, and each kind of stage adds up to one", ({ a, b }) => {
    expect([...a].reverse()).toEqual(a);
    expect([...b].reverse()).toEqual(b);
    expect(b.length).toBe(a.length + 1);
    for (const stages of [a, b])
      expect(Math.abs(stages.reduce((s, v) => s + v, 0) - 1)).toBeLessThan(ROUND_OFF);
  });

  it.each(
    splittings.flatMap((splitting) =>
      (["a", "b"] as const).flatMap((kind) =>
        splitting[kind].map((_, stage) => ({ splitting, order: splitting.order, kind, stage })),
      ),
    ),
  )("order $order: an error of 1e-6 in $kind[$stage] is caught", ({ splitting, order, kind, stage }) => {
    const stages = [...splitting[kind]];
    stages[stage] += 1e-6;
    const wrong = { ...splitting, [kind]: stages };
    expect(worst(wrong, upTo(Math.min(order, 4)))).toBeGreaterThan(1e-7);
  });
});

/** Force of the Henon-Heiles potential (x^2 + y^2)/2 + x^2 y - y^3/3 (Astron. J. 69, 73 (1964), citation from memory). */
function kick(orbit: number[], t: number): void {
  const [x, y] = orbit;
  orbit[2] -= t * (x + 2 * x * y);
  orbit[3] -= t * (y + x * x - y * y);
}

function drift(orbit: number[], t: number): void {
  orbit[0] += t * orbit[2];
  orbit[1] += t * orbit[3];
}

/** Position and momentum after a time of 4, in steps of `dt`, with the given roles of A and B. */
function orbitEnd({ a, b }: Splitting, dt: number, outer = kick, inner = drift): number[] {
  const orbit = [0.3, -0.2, 0.25, 0.35];
  for (let step = 0; step < Math.round(4 / dt); step++)
    b.forEach((coefficient, stage) => {
      outer(orbit, coefficient * dt);
      if (stage < a.length) inner(orbit, a[stage] * dt);
    });
  return orbit;
}

function measuredOrder(splitting: Splitting, dt: number, outer = kick, inner = drift): number {
  const exact = orbitEnd(NYSTROM_6, 0.01);
  const error = (step: number) =>
    Math.hypot(...orbitEnd(splitting, step, outer, inner).map((value, i) => value - exact[i]));
  return Math.log2(error(dt) / error(dt / 2));
}

describe("splittings on a nonlinear orbit (Henon and Heiles, 1964)", () => {
  it.each([
    [STRANG, 0.05],
    [NYSTROM_4, 0.25],
    [NYSTROM_6, 0.5],
  ])("converge with their order, the kicks outermost: %#", (splitting, dt) => {
    expect(Math.abs(measuredOrder(splitting, dt) - splitting.order)).toBeLessThan(0.15);
  });

  it("the set of order 6 loses it when kicks and drifts exchange their roles", () => {
    expect(measuredOrder(NYSTROM_6, 0.5, drift, kick)).toBeLessThan(5);
  });
});
