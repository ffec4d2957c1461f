import { gaussLegendre } from "../numerics/quadrature.js";
import type { Phased, PhaseStep } from "./phase-division.js";

/** What is known of an integrand at one place. */
export interface Sample {
  readonly value: number;
  /** Bound on the error of the value. */
  readonly error: number;
}

/** An integrand with a phase beside it that tells where it may have a narrow peak. */
export interface Integrand extends Phased {
  sample(s: number): Sample;
  /** Bound on the integral over a panel too narrow to be divided, in which the phase steps. */
  unresolved(a: number, b: number): number;
}

export interface PanelIntegral {
  readonly value: number;
  readonly error: number;
  /** Number of places looked at. */
  readonly evaluations: number;
}

/** Points of the two rules on a panel; their difference is taken for the error of the better one, which is far smaller. */
const COARSE = gaussLegendre(10);
const FINE = gaussLegendre(16);
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
 * Integral over the panels of `divideByPhase`, divided further until two Gauss-Legendre rules agree on each.
 * @param onPanels called after each round of divisions with the number of evaluations so far
 */
export function integratePanels(
  integrand: Integrand,
  steps: readonly PhaseStep[],
  onPanels?: (evaluations: number) => void,
): PanelIntegral {
  const each = COARSE.nodes.length + FINE.nodes.length;
  const lost = steps.reduce(
    (sum, { a, b, unresolved }) => sum + (unresolved ? integrand.unresolved(a, b) : 0),
    0,
  );
  let panels = steps.map(({ a, b }) => panelOf(integrand, a, b));
  let evaluations = panels.length * each;
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
      evaluations += 2 * each;
    }
    onPanels?.(evaluations);
    const done = next.length === panels.length;
    panels = next;
    if (done) break;
  }
  // Small parts first, so that nothing of them is lost in the sum.
  const ordered = [...panels].sort((p, q) => p.value - q.value);
  const value = ordered.reduce((sum, panel) => sum + panel.value, 0);
  const error = panels.reduce((sum, panel) => sum + panel.change + panel.noise, lost);
  return { value, error: error + panels.length * 2 ** -53 * value, evaluations };
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
