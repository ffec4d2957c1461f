/** A panel over which the phase moves by `turn`. */
export interface PhaseStep {
  readonly a: number;
  readonly b: number;
  readonly turn: number;
  /** True when the phase steps within a panel too narrow to be divided. */
  readonly unresolved: boolean;
}

/** What the division asks of an integrand. */
export interface Phased {
  /** Grows by about pi across every narrow peak, however narrow, and else by little over a first panel. */
  phase(s: number): number;
  /** True when double precision can tell no further places apart in the panel. */
  indivisible(a: number, b: number): boolean;
}

/** A panel in which the phase moves by more is divided: a peak a tenth as wide as a panel already moves it by 2. */
const MOST_TURN = 1;

/** Divides the panels between `places` (ascending) until the phase moves little over each, so that panels shrink towards every narrow peak. */
export function divideByPhase(
  integrand: Phased,
  places: readonly number[],
): { steps: PhaseStep[]; evaluations: number } {
  const steps: PhaseStep[] = [];
  let evaluations = places.length;
  const divide = (a: number, b: number, phaseA: number, phaseB: number): void => {
    const turn = phaseB - phaseA;
    const middle = (a + b) / 2;
    const plain = Math.abs(turn) <= MOST_TURN;
    if (plain || integrand.indivisible(a, b) || !(middle > a && middle < b)) {
      steps.push({ a, b, turn, unresolved: !plain });
      return;
    }
    const phase = integrand.phase(middle);
    evaluations++;
    divide(a, middle, phaseA, phase);
    divide(middle, b, phase, phaseB);
  };
  const phases = places.map((s) => integrand.phase(s));
  for (let i = 0; i + 1 < places.length; i++) divide(places[i], places[i + 1], phases[i], phases[i + 1]);
  return { steps, evaluations };
}
