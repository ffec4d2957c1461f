/** Nodes in (-1, 1), ascending, and weights that sum to 2. */
export interface QuadratureRule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

const rules = new Map<number, QuadratureRule>();

/**
 * Gauss-Legendre rule of n points on [-1, 1], exact for polynomials up to degree 2n - 1. Rules are kept once made.
 * The nodes are found by Newton's method on P_n from the start cos(pi (i + 3/4) / (n + 1/2)); cost O(n^2).
 * @throws {RangeError} unless n is a whole number from 1 on.
 * Source: the asymptotic start and w_i = 2 / ((1 - x_i^2) P_n'(x_i)^2) are in every numerical analysis text.
 */
export function gaussLegendre(n: number): QuadratureRule {
  if (!Number.isInteger(n) || n < 1)
    throw new RangeError(`a rule needs a whole number of points from 1 on; got ${n}`);
  let rule = rules.get(n);
  if (rule === undefined) {
    rule = makeRule(n);
    rules.set(n, rule);
  }
  return rule;
}

function makeRule(n: number): QuadratureRule {
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < (n + 1) >> 1; i++) {
    let x = 2 * i + 1 === n ? 0 : Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    // Quadratic convergence from four digits: the third step is already idle, the fourth costs nothing.
    for (let step = 0; step < 4; step++) {
      const [p, slope] = legendre(n, x);
      x -= p / slope;
    }
    const [, slope] = legendre(n, x);
    nodes[i] = -x;
    nodes[n - 1 - i] = x;
    weights[i] = weights[n - 1 - i] = 2 / ((1 - x * x) * slope * slope);
  }
  return { nodes, weights };
}

/** P_n(x) and its derivative by the three-term recurrence (j + 1) P_{j+1} = (2j + 1) x P_j - j P_{j-1}. */
function legendre(n: number, x: number): [value: number, slope: number] {
  let previous = 1;
  let value = x;
  for (let j = 1; j < n; j++) {
    const next = ((2 * j + 1) * x * value - j * previous) / (j + 1);
    previous = value;
    value = next;
  }
  return [value, (n * (x * value - previous)) / (x * x - 1)];
}

/**
 * Integral of f from a to b by Gauss-Legendre rules on equal panels.
 * @param panel greatest width of a panel; Infinity for a single one.
 * @param n points in each panel. Cost: n evaluations of f a panel.
 */
export function integrate(f: (x: number) => number, a: number, b: number, panel: number, n: number): number {
  const { nodes, weights } = gaussLegendre(n);
  const panels = Math.max(1, Math.ceil((b - a) / panel));
  const half = (b - a) / (2 * panels);
  let sum = 0;
  for (let p = 0; p < panels; p++) {
    const centre = a + (2 * p + 1) * half;
    for (let i = 0; i < n; i++) sum += weights[i] * f(centre + half * nodes[i]);
  }
  return sum * half;
}
