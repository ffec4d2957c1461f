/**
 * Random numbers that are the same everywhere for the same seed: a 32-bit counter that grows by the golden ratio's fraction of 2^32 (odd, so that
 * all 2^32 values come before one repeats) and is mixed by shifts and multiplications. The multipliers are those of a published search for
 * 32-bit mixers of little bias (C. Wellons, 2018; value from memory). Good for drawing designs, for nothing secret.
 */
export class MixingGenerator {
  private counter: number;

  /** @param words integers that together are the seed: a user's own, and which design is drawn with it */
  constructor(...words: readonly number[]) {
    this.counter = 0;
    for (const word of words) this.counter = mix(this.counter ^ mix(word >>> 0));
  }

  /** Even in [0, 1), 32 bits. */
  unit(): number {
    this.counter = (this.counter + 0x9e3779b9) >>> 0;
    return mix(this.counter) / 2 ** 32;
  }

  /** Even in [low, high). */
  between(low: number, high: number): number {
    return low + (high - low) * this.unit();
  }

  /** In [low, high) with an even logarithm. */
  decades(low: number, high: number): number {
    return low * (high / low) ** this.unit();
  }

  /** A whole number from low to high, both included. */
  whole(low: number, high: number): number {
    return low + Math.floor((high - low + 1) * this.unit());
  }

  chance(probability: number): boolean {
    return this.unit() < probability;
  }

  /** One of several, each as likely as its weight says. */
  pick<T extends string>(weights: Readonly<Record<T, number>>): T {
    const names = Object.keys(weights) as T[];
    const total = names.reduce((sum, name) => sum + weights[name], 0);
    let rest = total * this.unit();
    for (const name of names) {
      rest -= weights[name];
      if (rest < 0) return name;
    }
    return names[names.length - 1];
  }
}

function mix(word: number): number {
  let z = word >>> 0;
  z = Math.imul(z ^ (z >>> 16), 0x21f0aaad);
  z = Math.imul(z ^ (z >>> 15), 0x735a2d97);
  return (z ^ (z >>> 15)) >>> 0;
}
