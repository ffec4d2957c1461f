import { shape } from "../stationary/helpers.js";
import { parabola } from "./made-potentials.js";
import type { PublishedCurve, PublishedForm } from "./published-curve.js";
import { BENT, BENT_WIDEST } from "./values-sloped.js";

type Points = PublishedCurve["points"];

/** 1.00782503 u in m_e; u and m_e of CODATA 2022. */
const HYDROGEN = (1.00782503 * 1.66053906892e-27) / 9.1093837139e-31;

// E - V0 is 5 meV of rounded 0.2 eV.
const STEP_PRINTED = 1e-14;

export const SMOOTH_STEP: PublishedForm = {
  source: "smooth step (Landau & Lifshitz, par. 25, problem 3, citation from memory)",
  curves: [
    {
      title: "0.2 eV up, 1 nm",
      mass: 0.067,
      potential: shape("step", { height: 0.2, thickness: 1 }, 0.067),
      points: [
        [0.205, 0.7098398010103686],
        [0.21, 0.826392102408996],
        [0.25, 1 - 1.960323623907595e-2],
        [0.3, 1 - 3.764086028973951e-3],
      ],
      printed: STEP_PRINTED,
    },
    {
      title: "0.2 eV down, 1 nm",
      mass: 0.067,
      potential: shape("step", { height: -0.2, thickness: 1 }, 0.067),
      points: [[0.005, 0.7098398010103686]],
      printed: STEP_PRINTED,
    },
  ],
};

const sech2 = (
  title: string,
  mass: number,
  height: number,
  width: number,
  points: Points,
): PublishedCurve => ({
  title: `${title}, ${height} eV, ${width} nm`,
  mass,
  potential: shape("sech2", { height, width }, mass),
  points,
});

export const SECH2: PublishedForm = {
  source: "sech2 barrier and well (Landau & Lifshitz, par. 25, problem 4, citation from memory)",
  curves: [
    sech2("0.067 m_e", 0.067, 0.3, 2, [
      [0.05, 7.446144593935215e-3],
      [0.1, 3.520638426715398e-2],
      [0.2, 0.2462433131609464],
      [0.3, 0.6357812944178833],
      [0.4, 0.8775333289296477],
      [0.6, 0.9871057994618823],
    ]),
    sech2("0.067 m_e", 0.067, -0.2, 2, [
      [0.002, 0.2745105809965735],
      [0.01, 0.6937679163420196],
      [0.05, 0.9625879723647789],
    ]),
    sech2("an electron", 1, 5, 0.2, [
      [1, 4.932584807184193e-4],
      [3, 5.225769226096385e-2],
      [5, 0.5858839192587096],
      [7, 0.9518690499363262],
    ]),
    sech2("a hydrogen atom", HYDROGEN, 0.425, 0.05, [
      [0.2, 8.215820269245101e-7],
      [0.3, 8.424773059272073e-4],
      [0.425, 0.5274377527450894],
      [0.5, 0.9804868494470403],
    ]),
  ],
};

/** Eckart's own A, B (eV) and l (nm); here the top is (A + B)^2/(4B) and the width l/(2 pi). */
const eckart = (mass: number, A: number, B: number, l: number, points: Points): PublishedCurve => ({
  title: `A = ${A} eV, B = ${B} eV, l = ${l} nm, ${mass === HYDROGEN ? "a hydrogen atom" : `${mass} m_e`}`,
  mass,
  potential: shape("eckart", { height: (A + B) ** 2 / (4 * B), drop: A, width: l / (2 * Math.PI) }, mass),
  points,
  // The three parameters are rounded on the way: B comes back to 4e-16, in an exponent of up to 30.
  printed: 3e-14,
});

export const ECKART: PublishedForm = {
  source: "Eckart's barrier (C. Eckart, Phys. Rev. 35, 1303 (1930), eq. (15))",
  curves: [
    eckart(0.067, -0.1, 1, 6, [
      [0.02, 2.798924399760035e-2],
      [0.1, 0.2235304025920055],
      [0.2, 0.6464394511420088],
      [0.3, 0.8887685794872906],
    ]),
    eckart(0.067, 0.1, 1.2, 6, [
      [0.101, 1.856914408870297e-3],
      [0.15, 3.551659629188216e-2],
      [0.25, 0.2547242517642545],
      [0.4, 0.7788742857214642],
    ]),
    eckart(HYDROGEN, -0.5, 2, 0.2, [
      [0.1, 7.352509625250091e-7],
      [0.2, 3.523585197907786e-3],
      [0.3, 0.786910447536261],
    ]),
  ],
};

export const PARABOLA: PublishedForm = {
  source:
    "parabolic barrier, T = 1/(1 + exp(2 pi (V0 - E)/hbar omega)) (Kemble, Phys. Rev. 48, 549 (1935); Hill & Wheeler, Phys. Rev. 89, 1102 (1953); both as cited in arXiv:1302.1030)",
  curves: [
    {
      title: "V0 = 0.3 eV, hbar omega = 0.1 eV",
      mass: 0.067,
      potential: parabola({ top: 0.3, quantum: 0.1, mass: 0.067 }),
      points: [
        [0.1, 3.487330194694697e-6],
        [0.2, 1.863961889625028e-3],
        [0.28, 0.2215533465498947],
        [0.3, 0.5],
        [0.35, 0.9585761678336372],
        [0.5, 0.9999965126698053],
      ],
      witnessOnly: BENT,
      widest: BENT_WIDEST,
    },
  ],
};
