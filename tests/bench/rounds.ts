/** Something that can advance by a number of steps and say how long that took, in seconds. */
export interface Contestant {
  readonly name: string;
  step(count: number): number | Promise<number>;
}

/** Middle, least and greatest of some measurements. */
export interface Spread {
  readonly median: number;
  readonly min: number;
  readonly max: number;
}

export interface Comparison {
  /** Microseconds a step. */
  readonly first: Spread;
  readonly second: Spread;
  /** Time of the second over time of the first, round by round. */
  readonly ratio: Spread;
}

/** Rounds that are run and thrown away: compilers and caches settle in them. */
const WARM_UP_ROUNDS = 5;
/** Rounds that count; odd, so that the median is one of them. */
export const ROUNDS = 41;

export function spread(values: readonly number[]): Spread {
  const sorted = [...values].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  const median = sorted.length % 2 === 1 ? sorted[half] : 0.5 * (sorted[half - 1] + sorted[half]);
  return { median, min: sorted[0], max: sorted[sorted.length - 1] };
}

/**
 * Runs two contestants in turn (A B, B A, A B, ...), `count` steps each time, so that what else happens on the machine
 * meets both alike; the ratio is taken within each round.
 */
export async function compare(first: Contestant, second: Contestant, count: number): Promise<Comparison> {
  const times: [number, number][] = [];
  for (let round = 0; round < WARM_UP_ROUNDS + ROUNDS; round++) {
    const pair: [number, number] = [0, 0];
    for (const turn of round % 2 === 0 ? ([0, 1] as const) : ([1, 0] as const))
      pair[turn] = (await [first, second][turn].step(count)) / count;
    if (round >= WARM_UP_ROUNDS) times.push(pair);
  }
  return {
    first: spread(times.map(([a]) => a * 1e6)),
    second: spread(times.map(([, b]) => b * 1e6)),
    ratio: spread(times.map(([a, b]) => b / a)),
  };
}
