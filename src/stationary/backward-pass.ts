import { type TransferChain, UNIT_ROUNDOFF as U } from "./chain.js";
import { type ForwardPass, LARGE, SMALL } from "./forward-pass.js";

/** Units of rounding in a product M y, and in taking a common phase out of it. */
const PRODUCT = 2 * U;
const ROTATION = 4 * U;

/** Bounds on |dA|, in units of 2^(exponent of A), and on |d arg A|. */
export interface AmplitudeError {
  readonly error: number;
  readonly phaseError: number;
}

/**
 * Carries the row vectors w_j with A = w_j y_j from the near face to the far one and adds up, to first order,
 * |dA| <= sum |w_j+1| (|dM_j| + roundings |M_j|) |y_j|, and for the phase |Im(dA/A)|: of each term the part that stands across A.
 * What changes M or rounds the real part p of y = c (p + i q) is real but for the phase c; what rounds q is as small as q.
 *
 * @param start w at the near face: (1/2, i/(2v)); `velocity` is v
 * @param farSlack uncertainty of eta at the far face
 * @param cut that of eta/psi at either face, for what was cut away beyond it
 */
export function amplitudeError(
  chain: TransferChain,
  { y, phases, exponents }: ForwardPass,
  fromLeft: boolean,
  velocity: number,
  [ar, ai]: readonly [number, number],
  farSlack: number,
  cut: number,
): AmplitudeError {
  const { count, entries, bounds } = chain;
  const whole = exponents[count];
  const square = ar * ar + ai * ai;
  // w conj(A), so that what is across A is its imaginary part.
  let [pr, pi, er, ei] = [0.5 * ar, -0.5 * ai, (0.5 / velocity) * ai, (0.5 / velocity) * ar];
  let exponent = 0;
  const length = (re: number, im: number) => Math.sqrt(re * re + im * im);
  let sum = cut * length(er, ei) * length(y[4 * count], y[4 * count + 1]);
  let across = sum;
  for (let j = count - 1; j >= 0; j--) {
    const element = fromLeft ? count - 1 - j : j;
    const at = 4 * element;
    const first = fromLeft ? at + 3 : at;
    const last = fromLeft ? at : at + 3;
    const a = entries[first];
    const b = entries[at + 1];
    const c = entries[at + 2];
    const d = entries[last];
    const psiRe = y[4 * j];
    const psiIm = y[4 * j + 1];
    const etaRe = y[4 * j + 2];
    const etaIm = y[4 * j + 3];
    const wPsi = length(pr, pi);
    const wEta = length(er, ei);
    const psi = length(psiRe, psiIm);
    const eta = length(etaRe, etaIm);
    const rounding = PRODUCT + ROTATION;
    const share =
      wPsi *
        ((bounds[first] + rounding * Math.abs(a)) * psi + (bounds[at + 1] + rounding * Math.abs(b)) * eta) +
      wEta *
        ((bounds[at + 2] + rounding * Math.abs(c)) * psi + (bounds[last] + rounding * Math.abs(d)) * eta);
    // With the phase of y taken over by w: real and imaginary parts of w conj(A) c.
    const cr = phases[2 * j];
    const ci = phases[2 * j + 1];
    const wr = pr * cr - pi * ci;
    const wi = pr * ci + pi * cr;
    const ur = er * cr - ei * ci;
    const ui = er * ci + ei * cr;
    const changed =
      bounds[first] * Math.abs(wr * psiIm + wi * psiRe) +
      bounds[at + 1] * Math.abs(wr * etaIm + wi * etaRe) +
      bounds[at + 2] * Math.abs(ur * psiIm + ui * psiRe) +
      bounds[last] * Math.abs(ur * etaIm + ui * etaRe);
    const rounded =
      PRODUCT *
      (Math.abs(wi) * (Math.abs(a * psiRe) + Math.abs(b * etaRe)) +
        Math.abs(ui) * (Math.abs(c * psiRe) + Math.abs(d * etaRe)) +
        wPsi * (Math.abs(a * psiIm) + Math.abs(b * etaIm)) +
        wEta * (Math.abs(c * psiIm) + Math.abs(d * etaIm)));
    const scale = 2 ** (exponent + chain.exponents[element] + exponents[j] - whole);
    sum += share * scale;
    // The last term: w itself is rounded too, which blurs what is across by units of units.
    across +=
      (changed + rounded + 16 * (count + 1) * U * share) * scale +
      rotated(y, phases, j + 1, pr, pi, er, ei) * 2 ** (exponent + exponents[j + 1] - whole) +
      ROTATION * square;
    const nr = pr * a + er * c;
    const ni = pi * a + ei * c;
    er = pr * b + er * d;
    ei = pi * b + ei * d;
    pr = nr;
    pi = ni;
    exponent += chain.exponents[element];
    const size = Math.max(Math.abs(pr), Math.abs(pi), Math.abs(er), Math.abs(ei));
    if (size > LARGE || size < SMALL) {
      const shift = Math.floor(Math.log2(size));
      const factor = 2 ** -shift;
      pr *= factor;
      pi *= factor;
      er *= factor;
      ei *= factor;
      exponent += shift;
    }
  }
  // The start itself: v on the far side, and what was cut away beyond its face.
  const end = length(er, ei) * (farSlack + cut) * 2 ** (exponent - whole);
  return { error: (sum + end) / Math.sqrt(square), phaseError: (across + end) / square };
}

/** What taking the common phase out of y at interface j rounds, as far as it stands across. */
function rotated(
  y: Float64Array,
  phases: Float64Array,
  j: number,
  pr: number,
  pi: number,
  er: number,
  ei: number,
): number {
  const cr = phases[2 * j];
  const ci = phases[2 * j + 1];
  const psi = Math.abs((pr * ci + pi * cr) * y[4 * j]) + Math.abs((pr * cr - pi * ci) * y[4 * j + 1]);
  const eta = Math.abs((er * ci + ei * cr) * y[4 * j + 2]) + Math.abs((er * cr - ei * ci) * y[4 * j + 3]);
  return ROTATION * (psi + eta);
}
