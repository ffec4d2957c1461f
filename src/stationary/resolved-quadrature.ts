import { gaussLegendre } from "../numerics/quadrature.js";

/** What is known of an integrand at one place. */
export interface Sample {
  readonly value: number;
  /** Bound on the error of the value. */
  readonly error: number;
}

/** An integrand with a phase beside it that tells where it may have a narrow peak. */
export interface Integrand {
  sample(s: number): Sample;
  /** Grows by about pi across every narrow peak, however narrow, and else by little over a first panel. */
  phase(s: number): number;
  /** Bound on the integral over a panel too narrow to be divided. */
  unresolved(a: number, b: number): number;
  /** True when double precision can tell no further places apart in the panel. */
  indivisible(a: number, b: number): boolean;
}

/** A panel over which the phase moves by `turn`. */
export interface PhaseStep {
  readonly a: number;
  readonly b: number;
  readonly turn: number;
}

export interface ResolvedIntegral {
  readonly value: number;
  readonly error: number;
  /** Number of places looked at. */
  readonly evaluations: number;
  /** The panels into which the phase divided the range, ascending. */
  readonly steps: readonly PhaseStep[];
}

/** Points of the two rules on a panel; their difference is taken for the error of the better one, which is far smaller. */
const COARSE = gaussLegendre(10);
const FINE = gaussLegendre(16);
/** A panel in which the phase moves by more is divided: peaks a tenth as wide as a panel already move it by 2. */
const MOST_TURN = 1;
/** A panel is divided while its error estimate is above this part of the whole integral, and above its own rounding. */
const PANEL_TOLERANCE = 3e-16;
/** Evaluations after which the panels stay as they are; what is left of their error estimates is in the bound. */
const MOST_EVALUATIONS = 2_000_000;

interface Panel {
  readonly a: number;
  readonly b: number;
  readonly value: number;
  readonly change: number;
  readonly noise: number;
}

/**
 * Integral over panels between the given places, first divided until no panel hides a step of the phase, then until two Gauss-Legendre rules
 * agree on each. A peak of width w is so met at panels that shrink towards it down to w, however narrow it is.
 *
 * @param places ascending; the ends of the first panels
 * @param onPanel called after each division with the number of evaluations so far
 */
export function resolvedIntegral(
  integrand: Integrand,
  places: readonly number[],
  onPanel?: (evaluations: number) => void,
): ResolvedIntegral {
  const steps: PhaseStep[] = [];
  let evaluations = places.length;
  let lost = 0;
  const divide = (a: number, b: number, phaseA: number, phaseB: number): void => {
    const turn = phaseB - phaseA;
    if (Math.abs(turn) > MOST_TURN) {
      const middle = (a + b) / 2;
      if (!integrand.indivisible(a, b) && middle > a && middle < b) {
        const phase = integrand.phase(middle);
        evaluations++;
        divide(a, middle, phaseA, phase);
        divide(middle, b, phase, phaseB);
        return;
      }
      lost += integrand.unresolved(a, b);
    }
    steps.push({ a, b, turn });
  };
  const phases = places.map((s) => integrand.phase(s));
  for (let i = 0; i + 1 < places.length; i++) divide(places[i], places[i + 1], phases[i], phases[i + 1]);

  let panels = steps.map(({ a, b }) => panelOf(integrand, a, b));
  evaluations += panels.length * (COARSE.nodes.length + FINE.nodes.length);
  for (;;) {
    const whole = panels.reduce((sum, panel) => sum + panel.value, 0);
    const next: Panel[] = [];
    for (const panel of panels) {
      const middle = (panel.a + panel.b) / 2;
      const settled =
        panel.change <= Math.max(PANEL_TOLERANCE * whole, panel.noise) ||
        integrand.indivisible(panel.a, panel.b) ||
        evaluations > MOST_EVALUATIONS ||
        !(middle > panel.a && middle < panel.b);
      if (settled) {
        next.push(panel);
        continue;
      }
      next.push(panelOf(integrand, panel.a, middle), panelOf(integrand, middle, panel.b));
      evaluations += 2 * (COARSE.nodes.length + FINE.nodes.length);
      onPanel?.(evaluations);
    }
    const done = next.length === panels.length;
    panels = next;
    if (done) break;
  }
  // Small parts first, so that nothing of them is lost in the sum.
  const ordered = [...panels].sort((p, q) => p.value - q.value);
  const value = ordered.reduce((sum, panel) => sum + panel.value, 0);
  const error = panels.reduce((sum, panel) => sum + panel.change + panel.noise, lost);
  return { value, error: error + panels.length * 2 ** -53 * value, evaluations, steps };
}

function panelOf(integrand: Integrand, a: number, b: number): Panel {
  const [centre, half] = [(a + b) / 2, (b - a) / 2];
  let coarse = 0;
  for (let i = 0; i < COARSE.nodes.length; i++)
    coarse += COARSE.weights[i] * integrand.sample(centre + half * COARSE.nodes[i]).value;
  let fine = 0;
  let noise = 0;
  for (let i = 0; i < FINE.nodes.length; i++) {
    const { value, error } = integrand.sample(centre + half * FINE.nodes[i]);
    fine += FINE.weights[i] * value;
    noise += FINE.weights[i] * error;
  }
  return { a, b, value: fine * half, change: Math.abs(fine - coarse) * half, noise: noise * half };
}
