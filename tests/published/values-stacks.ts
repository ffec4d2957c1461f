import { layers } from "../stationary/helpers.js";
import type { PublishedCurve, PublishedForm } from "./published-curve.js";

type Points = PublishedCurve["points"];

const walled = (
  mass: number,
  own: number,
  height: number,
  width: number,
  points: Points,
): PublishedCurve => ({
  title: `${mass} and ${own} m_e, ${height} eV, ${width} nm`,
  mass,
  potential: layers(mass, [width, height, own]),
  points,
});

export const MASS_MISMATCH: PublishedForm = {
  source: "barrier with a mass of its own (BenDaniel & Duke, Phys. Rev. 152, 683 (1966))",
  curves: [
    walled(0.067, 0.0919, 0.2591, 5, [
      [0.05, 2.448684047909122e-3],
      [0.1, 8.082191349397394e-3],
      [0.2, 5.305222311106075e-2],
      [0.3, 0.3289382901646195],
      [0.5, 0.8964953106602382],
    ]),
    walled(0.043, 0.075, 0.52, 3, [
      [0.2, 3.355420960132489e-2],
      [0.7, 0.4594531318873934],
    ]),
    walled(0.067, 0.15, 1, 2, [
      [0.1, 1.370234426783348e-3],
      [0.5, 1.24107140026374e-2],
    ]),
    walled(0.19, 0.5, 3.15, 1.5, [[0.1, 6.68761341154142e-9]]),
    walled(0.026, 0.14, 1.35, 3, [[0.1, 8.762145912537686e-6]]),
  ],
};

// At a peak 13 digits of an unequal stack are printed; the place of a peak shows in T only squared.
const PEAK_PRINTED = 1e-13;

const double = (
  title: string,
  mass: number,
  stack: Parameters<typeof layers>[1][],
  points: Points,
  ringing: readonly number[] = [],
): PublishedCurve => ({
  title,
  mass,
  potential: layers(mass, ...stack),
  points,
  printed: PEAK_PRINTED,
  ringing,
});

/** Energies ascend; those with T = 1 and that of the unequal stack with 0.695 are peaks. */
export const DOUBLE_BARRIERS: PublishedForm = {
  source:
    "double barrier (transfer matrix; Tsu & Esaki, Appl. Phys. Lett. 22, 562 (1973), for the kind; unequal walls: Ricco & Azbel, Phys. Rev. B 29, 1970 (1984))",
  curves: [
    double(
      "2/5/2 nm, 0.5 eV",
      0.067,
      [
        [2, 0.5],
        [5, 0],
        [2, 0.5],
      ],
      [
        [0.05, 6.488899791270834e-4],
        [0.1, 0.2283180092561173],
        [0.105508907741088, 1],
        [0.2, 1.259653050764563e-2],
        [0.405440785623777, 1],
      ],
    ),
    double(
      "GaAs/Al0.3Ga0.7As 3/5/3 nm",
      0.067,
      [
        [3, 0.2591, 0.0919],
        [5, 0],
        [3, 0.2591, 0.0919],
      ],
      [
        [0.05, 1.373697640681958e-3],
        [0.0765418395533605, 1],
        [0.1, 1.196362129638354e-2],
        [0.2, 2.060747175327526e-2],
      ],
    ),
    double(
      "GaAs/AlAs 1.5/4.5/1.5 nm",
      0.067,
      [
        [1.5, 1, 0.15],
        [4.5, 0],
        [1.5, 1, 0.15],
      ],
      [
        [0.1, 1.987760905024361e-4],
        [0.124921711206708, 1],
        [0.15, 5.346988440267626e-4],
        [0.518661850315813, 1],
      ],
      // 0.7 ps: 12 s of work.
      [0.124921711206708],
    ),
    double(
      "InGaAs/InAlAs 3/4.5/3 nm",
      0.043,
      [
        [3, 0.52, 0.075],
        [4.5, 0],
        [3, 0.52, 0.075],
      ],
      [
        [0.1, 2.345414726611031e-4],
        [0.139912984075151, 1],
        [0.15, 1.097623616855677e-2],
      ],
      // 0.3 ps: 5 s of work.
      [0.139912984075151],
    ),
    double(
      "unequal 2/5/3 nm, 0.3 eV",
      0.067,
      [
        [2, 0.3],
        [5, 0],
        [3, 0.3],
      ],
      [
        [0.05, 3.590592165332103e-3],
        [0.0874540748731011, 0.6953479656417],
        [0.1, 0.1429084008131657],
        [0.2, 4.940434915090505e-2],
      ],
    ),
  ],
};
