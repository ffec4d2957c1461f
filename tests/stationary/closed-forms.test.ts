import { describe, expect, it } from "vitest";
import type { Potential } from "../../src/potentials/potential.js";
import { scatter } from "../../src/stationary/scattering.js";
import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import { delta as deltaTransmission } from "../potentials/closed-forms.js";
import { expectTransmission, layers, pieces, shape } from "./helpers.js";

// All values: closed forms computed for this project with 40 digits or more, CODATA 2022. Every title names the source of the formula. Values are
// printed to 16 digits or fewer; the tolerance beside the bound is that printing.

describe("rectangular barrier and well (Landau and Lifshitz, par. 25, problem 2, from memory)", () => {
  it.each([
    [0.067, 0.3, 5, 0.05, 2.931379918620528e-3],
    [0.067, 0.3, 5, 0.1, 9.40874805983665e-3],
    [0.067, 0.3, 5, 0.2, 5.242290397312273e-2],
    [0.067, 0.3, 5, 0.3, 0.2327064451892803],
    [0.067, 0.3, 5, 0.4, 0.7038645145629103],
    [0.067, 0.3, 5, 0.6, 0.9730520224184722],
    [1, 10, 0.5, 1, 3.044197176757443e-7],
    [1, 10, 0.5, 2, 1.303447128939847e-6],
    [1, 10, 0.5, 5, 4.23527592000644e-5],
    [1, 10, 0.5, 9, 8.606666961307583e-3],
    [1, 10, 0.5, 10, 5.745714279627833e-2],
    [1, 10, 0.5, 12, 0.8176563618053497],
    [1, 40, 0.1, 30, 0.1128780323283998],
    [1, 40, 1, 30, 2.542248872950885e-14],
    [1, 4.5, 0.5, 4, 4.266012651192274e-2],
    [0.067, -0.2, 10, 0.005, 0.5747092128576319],
    [0.067, -0.2, 10, 0.01, 0.833552120910568],
    [0.067, -0.2, 10, 0.05, 0.9151802418666033],
    [0.067, -0.2, 10, 0.1, 0.8130363595768083],
    [0.067, -0.2, 10, 0.2, 0.9151422258680078],
  ])("m = %f m_e, V0 = %f eV, a = %f nm, E = %f eV", (mass, height, width, energy, published) => {
    const barrier = shape("rectangular", { height, width }, mass);
    expectTransmission(barrier, mass, energy, published);
    expectTransmission(barrier, mass, energy, published, 5e-15, "right");
  });

  it.each([0.02449561916708811, 0.3051151431259483, 0.6979824766683524])(
    "lets everything pass a well at E = %f eV (Ramsauer condition)",
    (energy) => {
      const { transmission, reflection } = scatter(
        shape("rectangular", { height: -0.2, width: 10 }, 0.067),
        0.067 * ELECTRON_MASS,
        energy,
      );
      expect(reflection.value).toBeLessThan(1e-27);
      expect(1 - transmission.value).toBeLessThanOrEqual(transmission.error);
      expect(transmission.error).toBeLessThan(3e-16);
    },
  );
});

describe("potential step, with or without a change of mass (Landau and Lifshitz, par. 25, problem 1, from memory)", () => {
  it.each([
    [0.067, 0.067, 0.2, 0.201, 0.2461844269509081],
    [0.067, 0.067, 0.2, 0.21, 0.5881666528902848],
    [0.067, 0.067, 0.2, 0.25, 0.8541019662496845],
    [0.067, 0.067, 0.2, 0.4, 0.9705627484771406],
    [0.067, 0.067, -0.2, 0.01, 0.5881666528902848],
    [0.067, 0.0919, 0.2591, 0.27, 0.4999693771492835],
    [0.067, 0.0919, 0.2591, 0.4, 0.8928429561304269],
    [0.067, 0.0919, 0.2591, 1.0, 0.9766615961988814],
  ])("m1 = %f, m2 = %f m_e, V0 = %f eV, E = %f eV", (m1, m2, height, energy, published) => {
    const step = pieces([0], [0, height], [m1, m2]);
    // E - V0 of two rounded decimals: a unit of 0.2 eV in a millielectronvolt is 2e-14 of it.
    expectTransmission(step, m1, energy, published, 3e-14);
    expectTransmission(step, m2, energy, published, 3e-14, "right");
  });
});

describe("smooth step (Landau and Lifshitz, par. 25, problem 3, from memory)", () => {
  it.each([
    [0.2, 0.205, 0.7098398010103686],
    [0.2, 0.21, 0.826392102408996],
    [0.2, 0.25, 1 - 1.960323623907595e-2],
    [0.2, 0.3, 1 - 3.764086028973951e-3],
    [-0.2, 0.005, 0.7098398010103686],
  ])("V0 = %f eV, 1 nm, E = %f eV", (height, energy, published) => {
    const step = shape("step", { height, thickness: 1 }, 0.067);
    // As above: E - V0 is 5 meV of rounded 0.2 eV.
    expectTransmission(step, 0.067, energy, published, 1e-14);
  });
});

/** Two points of equal strength (eV nm) a distance apart, which no shape offers. */
function twoPoints(strength: number, distance: number, massInElectrons: number): Potential {
  const mass = massInElectrons * ELECTRON_MASS;
  const share = (x: number, a: number, b: number) => (x < a || x > b ? 0 : x === a || x === b ? 0.5 : 1);
  return {
    ...shape("delta", { strength }, massInElectrons),
    shape: "two points",
    cellAverage: (a, b) => (strength * (share(0, a, b) + share(distance, a, b))) / (b - a),
    mass: () => mass,
    massAverage: () => mass,
    interfaces: [0, distance],
    faces: [0, distance],
  };
}

describe("points of strength (D. J. Griffiths, sec. 2.5, from memory; two of them derived for this project)", () => {
  it.each([
    [0.067, 0.01, 8.339681739864004e-2],
    [0.067, 0.05, 0.3126785149351137],
    [0.067, 0.1, 0.4763977034400834],
    [0.067, 0.3, 0.7318703768376656],
    [1, 0.1, 5.745714279627833e-2],
    [1, 1, 0.3787265294253844],
    [1, 5, 0.7529635535093375],
  ])("0.5 eV nm, m = %f m_e, E = %f eV", (mass, energy, published) => {
    expectTransmission(shape("delta", { strength: 0.5 }, mass), mass, energy, published);
    // A well of the same strength transmits as much.
    expectTransmission(shape("delta", { strength: -0.5 }, mass), mass, energy, published, 5e-15, "right");
  });

  it.each([
    [0.01, 1.897774089623676e-3],
    [0.03, 0.103849149929273],
    [0.05, 0.1781294456773348],
    [0.1, 0.1031512844150729],
    [0.2, 0.4941779892437908],
    [0.3, 0.3780118919500292],
  ])("two of 0.5 eV nm, 10 nm apart, E = %f eV", (energy, published) => {
    expectTransmission(twoPoints(0.5, 10, 0.067), 0.067, energy, published);
  });

  it.each([0.0386315774743454, 0.165577009550423, 0.395449813499485])(
    "two of them let everything pass at E = %f eV",
    (energy) => {
      const { reflection } = scatter(twoPoints(0.5, 10, 0.067), 0.067 * ELECTRON_MASS, energy);
      // R grows like ((E - E_r)/width)^2 from the 15 digits printed of E_r.
      expect(reflection.value).toBeLessThan(1e-24);
    },
  );

  it("takes a point far from the origin for what it is", () => {
    const strength = 1e-3;
    const moved: Potential = {
      ...shape("delta", { strength }, 0.067),
      cellAverage: (a, b) => (a < 123.456 && b > 123.456 ? strength / (b - a) : 0),
      interfaces: [123.456],
      faces: [123.456, 123.456],
    };
    expectTransmission(moved, 0.067, 0.01, deltaTransmission(strength)(0.01, 0.067 * ELECTRON_MASS), 1e-15);
  });
});

const HYDROGEN = (1.00782503 * 1.66053906892e-27) / 9.1093837139e-31; // m_e; u and m_e of CODATA 2022

describe("sech2 barrier and well (Landau and Lifshitz, par. 25, problem 4, from memory)", () => {
  it.each([
    [0.067, 0.3, 2, 0.05, 7.446144593935215e-3],
    [0.067, 0.3, 2, 0.1, 3.520638426715398e-2],
    [0.067, 0.3, 2, 0.2, 0.2462433131609464],
    [0.067, 0.3, 2, 0.3, 0.6357812944178833],
    [0.067, 0.3, 2, 0.4, 0.8775333289296477],
    [0.067, 0.3, 2, 0.6, 0.9871057994618823],
    [0.067, -0.2, 2, 0.002, 0.2745105809965735],
    [0.067, -0.2, 2, 0.01, 0.6937679163420196],
    [0.067, -0.2, 2, 0.05, 0.9625879723647789],
    [1, 5, 0.2, 1, 4.932584807184193e-4],
    [1, 5, 0.2, 3, 5.225769226096385e-2],
    [1, 5, 0.2, 5, 0.5858839192587096],
    [1, 5, 0.2, 7, 0.9518690499363262],
    [HYDROGEN, 0.425, 0.05, 0.2, 8.215820269245101e-7],
    [HYDROGEN, 0.425, 0.05, 0.3, 8.424773059272073e-4],
    [HYDROGEN, 0.425, 0.05, 0.425, 0.5274377527450894],
    [HYDROGEN, 0.425, 0.05, 0.5, 0.9804868494470403],
  ])("m = %f m_e, V0 = %f eV, a = %f nm, E = %f eV", (mass, height, width, energy, published) => {
    const barrier = shape("sech2", { height, width }, mass);
    expectTransmission(barrier, mass, energy, published);
    expectTransmission(barrier, mass, energy, published, 5e-15, "right");
  });

  const unit = HBAR ** 2 / (2 * 0.067 * ELECTRON_MASS * 4);
  it.each([1, 2, 3])(
    "nothing is reflected by the well lambda (lambda + 1) K/(m a^2), lambda = %i",
    (lambda) => {
      const well = shape("sech2", { height: -lambda * (lambda + 1) * unit, width: 2 }, 0.067);
      for (const energy of [0.001, 0.01, 0.1, 0.5]) {
        const { reflection, transmission, transmittedAmplitude } = scatter(
          well,
          0.067 * ELECTRON_MASS,
          energy,
        );
        expect(reflection.value).toBeLessThan(1e-26);
        expect(reflection.error).toBeLessThan(1e-20);
        expect(1 - transmission.value).toBeLessThanOrEqual(transmission.error);
        // t = prod (k a + i n)/(k a - i n), referred to the centre; the faces add the free phase between them.
        const k = Math.sqrt(2 * 0.067 * ELECTRON_MASS * energy) / HBAR;
        let phase = k * (well.faces[1] - well.faces[0]);
        for (let n = 1; n <= lambda; n++) phase += 2 * Math.atan2(n, k * 2);
        // The phase of 80 nm of free motion, some tens of radians, is rounded to 1e-14.
        expect(Math.abs(transmittedAmplitude[0] - Math.cos(phase))).toBeLessThan(1e-13);
        expect(Math.abs(transmittedAmplitude[1] - Math.sin(phase))).toBeLessThan(1e-13);
      }
    },
  );
});

describe("Eckart's barrier (C. Eckart, Phys. Rev. 35, 1303 (1930), eq. (15))", () => {
  it.each([
    [0.067, -0.1, 1.0, 6, 0.02, 2.798924399760035e-2],
    [0.067, -0.1, 1.0, 6, 0.1, 0.2235304025920055],
    [0.067, -0.1, 1.0, 6, 0.2, 0.6464394511420088],
    [0.067, -0.1, 1.0, 6, 0.3, 0.8887685794872906],
    [0.067, 0.1, 1.2, 6, 0.101, 1.856914408870297e-3],
    [0.067, 0.1, 1.2, 6, 0.15, 3.551659629188216e-2],
    [0.067, 0.1, 1.2, 6, 0.25, 0.2547242517642545],
    [0.067, 0.1, 1.2, 6, 0.4, 0.7788742857214642],
    [HYDROGEN, -0.5, 2.0, 0.2, 0.1, 7.352509625250091e-7],
    [HYDROGEN, -0.5, 2.0, 0.2, 0.2, 3.523585197907786e-3],
    [HYDROGEN, -0.5, 2.0, 0.2, 0.3, 0.786910447536261],
  ])("m = %f m_e, A = %f, B = %f eV, l = %f nm, E = %f eV", (mass, A, B, l, energy, published) => {
    // The top (A + B)^2/(4B) and the length l/(2 pi) of this program's parameters.
    const barrier = shape(
      "eckart",
      { height: (A + B) ** 2 / (4 * B), drop: A, width: l / (2 * Math.PI) },
      mass,
    );
    // The three parameters are rounded on the way: B comes back to 4e-16, in an exponent of up to 30.
    expectTransmission(barrier, mass, energy, published, 3e-14);
    expectTransmission(barrier, mass, energy, published, 3e-14, "right");
  });
});

describe("rectangular barrier with a mass of its own (BenDaniel and Duke, Phys. Rev. 152, 683 (1966))", () => {
  it.each([
    [0.067, 0.0919, 0.2591, 5, 0.05, 2.448684047909122e-3],
    [0.067, 0.0919, 0.2591, 5, 0.1, 8.082191349397394e-3],
    [0.067, 0.0919, 0.2591, 5, 0.2, 5.305222311106075e-2],
    [0.067, 0.0919, 0.2591, 5, 0.3, 0.3289382901646195],
    [0.067, 0.0919, 0.2591, 5, 0.5, 0.8964953106602382],
    [0.043, 0.075, 0.52, 3, 0.2, 3.355420960132489e-2],
    [0.043, 0.075, 0.52, 3, 0.7, 0.4594531318873934],
    [0.067, 0.15, 1.0, 2, 0.1, 1.370234426783348e-3],
    [0.067, 0.15, 1.0, 2, 0.5, 1.24107140026374e-2],
    [0.19, 0.5, 3.15, 1.5, 0.1, 6.68761341154142e-9],
    [0.026, 0.14, 1.35, 3, 0.1, 8.762145912537686e-6],
  ])("mw = %f, mb = %f m_e, V0 = %f eV, b = %f nm, E = %f eV", (mw, mb, height, b, energy, published) => {
    expectTransmission(layers(mw, [b, height, mb]), mw, energy, published);
  });
});

describe("double barriers (Tsu and Esaki, Appl. Phys. Lett. 22, 562 (1973), for the kind; closed form by transfer matrices)", () => {
  const stacks = {
    "2/5/2": layers(0.067, [2, 0.5], [5, 0], [2, 0.5]),
    "3/5/3": layers(0.067, [3, 0.2591, 0.0919], [5, 0], [3, 0.2591, 0.0919]),
    "1.5/4.5/1.5": layers(0.067, [1.5, 1, 0.15], [4.5, 0], [1.5, 1, 0.15]),
    "3/4.5/3": layers(0.043, [3, 0.52, 0.075], [4.5, 0], [3, 0.52, 0.075]),
    "2/5/3": layers(0.067, [2, 0.3], [5, 0], [3, 0.3]),
  } as const;
  const massOf = (name: string) => (name === "3/4.5/3" ? 0.043 : 0.067);

  it.each([
    ["2/5/2", 0.05, 6.488899791270834e-4],
    ["2/5/2", 0.1, 0.2283180092561173],
    ["2/5/2", 0.2, 1.259653050764563e-2],
    ["3/5/3", 0.05, 1.373697640681958e-3],
    ["3/5/3", 0.1, 1.196362129638354e-2],
    ["3/5/3", 0.2, 2.060747175327526e-2],
    ["1.5/4.5/1.5", 0.1, 1.987760905024361e-4],
    ["1.5/4.5/1.5", 0.15, 5.346988440267626e-4],
    ["3/4.5/3", 0.1, 2.345414726611031e-4],
    ["3/4.5/3", 0.15, 1.097623616855677e-2],
    ["2/5/3", 0.05, 3.590592165332103e-3],
    ["2/5/3", 0.1, 0.1429084008131657],
    ["2/5/3", 0.2, 4.940434915090505e-2],
  ] as const)("%s off its peaks, E = %f eV", (name, energy, published) => {
    expectTransmission(stacks[name], massOf(name), energy, published);
    expectTransmission(stacks[name], massOf(name), energy, published, 5e-15, "right");
  });

  it.each([
    ["2/5/2", 0.105508907741088, 1],
    ["2/5/2", 0.405440785623777, 1],
    ["3/5/3", 0.0765418395533605, 1],
    ["1.5/4.5/1.5", 0.124921711206708, 1],
    ["1.5/4.5/1.5", 0.518661850315813, 1],
    ["3/4.5/3", 0.139912984075151, 1],
    // Unequal walls (Ricco and Azbel, Phys. Rev. B 29, 1970 (1984), for the case): 13 digits are printed.
    ["2/5/3", 0.0874540748731011, 0.6953479656417],
  ] as const)("%s at its peak, E = %f eV", (name, energy, published) => {
    expectTransmission(stacks[name], massOf(name), energy, published, 1e-13);
  });
});
