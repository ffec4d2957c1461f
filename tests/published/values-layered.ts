import { pieces, shape } from "../stationary/helpers.js";
import { twoPoints } from "./made-potentials.js";
import type { PublishedCurve, PublishedForm } from "./published-curve.js";

type Points = PublishedCurve["points"];

const rectangular = (mass: number, height: number, width: number, points: Points): PublishedCurve => ({
  title: `${mass} m_e, ${height} eV, ${width} nm`,
  mass,
  potential: shape("rectangular", { height, width }, mass),
  points,
});

const point = (mass: number, points: Points): PublishedCurve => ({
  title: `0.5 eV nm, ${mass} m_e`,
  mass,
  potential: shape("delta", { strength: 0.5 }, mass),
  points,
});

// E - V0 of two rounded decimals: a unit of 0.2 eV in a millielectronvolt is 2e-14 of it.
const STEP_PRINTED = 3e-14;

export const RECTANGULAR: PublishedForm = {
  source: "rectangular barrier and well (Landau & Lifshitz, par. 25, problem 2, citation from memory)",
  curves: [
    rectangular(0.067, 0.3, 5, [
      [0.05, 2.931379918620528e-3],
      [0.1, 9.40874805983665e-3],
      [0.2, 5.242290397312273e-2],
      [0.3, 0.2327064451892803],
      [0.4, 0.7038645145629103],
      [0.6, 0.9730520224184722],
    ]),
    rectangular(1, 10, 0.5, [
      [1, 3.044197176757443e-7],
      [2, 1.303447128939847e-6],
      [5, 4.23527592000644e-5],
      [9, 8.606666961307583e-3],
      [10, 5.745714279627833e-2],
      [12, 0.8176563618053497],
    ]),
    rectangular(1, 40, 0.1, [[30, 0.1128780323283998]]),
    rectangular(1, 40, 1, [[30, 2.542248872950885e-14]]),
    rectangular(1, 4.5, 0.5, [[4, 4.266012651192274e-2]]),
    rectangular(0.067, -0.2, 10, [
      [0.005, 0.5747092128576319],
      [0.01, 0.833552120910568],
      [0.05, 0.9151802418666033],
      [0.1, 0.8130363595768083],
      [0.2, 0.9151422258680078],
    ]),
  ],
};

export const SHARP_STEP: PublishedForm = {
  source:
    "sharp step, with or without a change of mass (Landau & Lifshitz, par. 25, problem 1, citation from memory)",
  curves: [
    {
      title: "0.2 eV up",
      mass: 0.067,
      potential: shape("step", { height: 0.2 }, 0.067),
      points: [
        [0.201, 0.2461844269509081],
        [0.21, 0.5881666528902848],
        [0.25, 0.8541019662496845],
        [0.4, 0.9705627484771406],
      ],
      printed: STEP_PRINTED,
    },
    {
      title: "0.2 eV down",
      mass: 0.067,
      potential: shape("step", { height: -0.2 }, 0.067),
      points: [[0.01, 0.5881666528902848]],
      printed: STEP_PRINTED,
    },
    {
      title: "0.2591 eV up, from 0.067 to 0.0919 m_e",
      mass: 0.067,
      potential: pieces([0], [0, 0.2591], [0.067, 0.0919]),
      points: [
        [0.27, 0.4999693771492835],
        [0.4, 0.8928429561304269],
        [1, 0.9766615961988814],
      ],
      printed: STEP_PRINTED,
      witnessOnly: "a packet's design has one mass on both sides",
    },
  ],
};

export const POINTS: PublishedForm = {
  source:
    "point of strength (D. J. Griffiths, Introduction to Quantum Mechanics, sec. 2.5, citation from memory)",
  curves: [
    point(0.067, [
      [0.01, 8.339681739864004e-2],
      [0.05, 0.3126785149351137],
      [0.1, 0.4763977034400834],
      [0.3, 0.7318703768376656],
    ]),
    point(1, [
      [0.1, 5.745714279627833e-2],
      [1, 0.3787265294253844],
      [5, 0.7529635535093375],
    ]),
  ],
};

export const TWO_POINTS: PublishedForm = {
  source:
    "two points of strength, T = 1/(1 + 4 beta^2 (cos kL + beta sin kL)^2) (derived for this project from Griffiths, sec. 2.5, citation from memory)",
  curves: [
    {
      title: "0.5 eV nm each, 10 nm apart",
      mass: 0.067,
      potential: twoPoints(0.5, 10, 0.067),
      points: [
        [0.01, 1.897774089623676e-3],
        [0.03, 0.103849149929273],
        [0.05, 0.1781294456773348],
        [0.1, 0.1031512844150729],
        [0.2, 0.4941779892437908],
        [0.3, 0.3780118919500292],
      ],
    },
  ],
};
