import { ELECTRON_MASS } from "../../src/units/constants.js";
import { slabs } from "../potentials/closed-forms.js";
import { sharpStep } from "../published/estimate-helpers.js";
import { drawPacket, packetFrom, tailPacket } from "./draw-packet.js";
import { type DrawnPacket, rounded, type Structure } from "./drawn-design.js";
import type { MixingGenerator } from "./mixing-generator.js";
import { scaleFor, wavenumberOf } from "./packet-guess.js";

/** The ranges: masses in m_e, heights in eV, and the deepest transmission. */
export const MASSES = [0.02, 1] as const;
const HEIGHTS = [-0.3, 1.2] as const;
export const DEEPEST_DECADES = 20;
/** Scales between which all widths of a drawn stack are stretched to meet a transmission, and its least and greatest layer, nm. */
const SCALES = [0.03, 30] as const;
const THINNEST = 0.2;
const THICKEST = 30;
/** Draws after which a transmission that cannot be met is given up and the last draw taken as it is. */
const PATIENCE = 30;

interface Layer {
  readonly width: number;
  readonly height: number;
  readonly mass: number;
}

export interface Drawn {
  readonly structure: Structure;
  readonly packet: DrawnPacket;
}

/** How often each theme is drawn. */
const THEMES = { stack: 56, resonance: 14, above: 12, step: 8, tail: 10 };

export function drawLayered(random: MixingGenerator): Drawn {
  const theme = random.pick(THEMES);
  switch (theme) {
    case "resonance":
      return drawResonance(random);
    case "above": {
      const structure = stackOf(theme, drawLayers(random), drawMass(random));
      return { structure, packet: drawPacket(random, structure, random.chance(0.3) ? "near" : "above") };
    }
    case "step":
      return drawStep(random);
    case "tail": {
      const layer = {
        width: random.between(2, 12),
        height: random.between(0.1, 1.2),
        mass: drawMass(random),
      };
      const structure = stackOf(theme, [layer].map(roundLayer), drawMass(random));
      return { structure, packet: tailPacket(random, structure, random.chance(0.5) ? "left" : "right") };
    }
    default:
      return drawAimed(random, theme);
  }
}

export const drawMass = (random: MixingGenerator) => rounded(random.decades(...MASSES), 3);

function drawLayers(random: MixingGenerator): Layer[] {
  return Array.from({ length: random.whole(1, 5) }, () =>
    roundLayer({
      width: random.decades(0.5, 8),
      height: random.between(...HEIGHTS),
      mass: drawMass(random),
    }),
  );
}

const roundLayer = ({ width, height, mass }: Layer): Layer => ({
  width: rounded(width, 4),
  height: Number(height.toFixed(4)),
  mass: rounded(mass, 3),
});

/** A stack at random, stretched so that the transmission comes near one drawn evenly over the decades. */
function drawAimed(random: MixingGenerator, theme: string): Drawn {
  const target = 10 ** -random.between(0, DEEPEST_DECADES);
  for (let draw = 1; ; draw++) {
    const layers = drawLayers(random);
    const mass = drawMass(random);
    const unscaled = stackOf(theme, layers, mass);
    const packet = drawPacket(random, unscaled, "below");
    const scale = scaleFor(unscaled, packet, target, ...SCALES);
    if (scale === undefined && draw < PATIENCE) continue;
    const scaled = layers.map((layer) =>
      roundLayer({ ...layer, width: Math.min(THICKEST, Math.max(THINNEST, layer.width * (scale ?? 1))) }),
    );
    return { structure: stackOf(theme, scaled, mass), packet };
  }
}

/** Two or three walls with wells between them and a packet over their energies; the walls' opacity sets how narrow the resonance is. */
function drawResonance(random: MixingGenerator): Drawn {
  const mass = drawMass(random);
  const wallMass = random.chance(0.5) ? mass : drawMass(random);
  const height = random.between(0.2, 1.2);
  const energy = height * random.between(0.1, 0.9);
  const kappa = wavenumberOf(height - energy, wallMass);
  // exp(-2 kappa w) of one wall, from nearly open to a resonance of some 1e-9 eV.
  const wall = () => Math.min(THICKEST, Math.max(THINNEST, random.between(0.3, 10) / (2 * kappa)));
  const well = () => ({
    width: Math.min(THICKEST, random.between(0.4, 2.5) * (Math.PI / wavenumberOf(energy, mass))),
    height: random.chance(0.7) ? 0 : random.between(-0.2, 0.8 * energy),
    mass,
  });
  const first = wall();
  const walls = random.chance(0.25) ? 3 : 2;
  const layers: Layer[] = [{ width: first, height, mass: wallMass }];
  for (let i = 1; i < walls; i++)
    layers.push(well(), { width: random.chance(0.6) ? first : wall(), height, mass: wallMass });
  const structure = stackOf("resonance", layers.map(roundLayer), mass);
  return { structure, packet: packetFrom(random, structure, random.chance(0.5) ? "left" : "right", energy) };
}

/** A sharp step up or down. */
function drawStep(random: MixingGenerator): Drawn {
  const mass = drawMass(random);
  const height = rounded((random.chance(0.5) ? 1 : -1) * random.decades(0.02, 1.2));
  const structure: Structure = {
    theme: "step",
    potential: ["shape: step", `height: ${height} eV`],
    mass,
    levelRight: height,
    top: Math.max(0, height),
    length: (2 * Math.PI) / wavenumberOf(Math.abs(height), mass),
    opacity: () => 0,
    closedForm: sharpStep(height),
  };
  return { structure, packet: stepPacket(random, structure) };
}

/** A packet that meets a step up or down, from just above it on. A design's mean energy lies above both levels, or it is refused. */
export function stepPacket(random: MixingGenerator, structure: Structure): DrawnPacket {
  const from = random.chance(0.5) ? "left" : "right";
  const rise = from === "left" ? structure.levelRight : -structure.levelRight;
  const energy = rise > 0 ? rise * random.decades(1.02, 6) : -rise * random.decades(0.1, 5);
  return packetFrom(random, structure, from, Math.max(0.01, energy));
}

function stackOf(theme: string, layers: readonly Layer[], mass: number): Structure {
  const lines = layers.map(
    ({ width, height, mass: inside }) =>
      `  - { width: ${width} nm, height: ${height} eV, mass: ${inside} m_e }`,
  );
  return {
    theme,
    potential: ["shape: layers", "layers:", ...lines],
    mass,
    levelRight: 0,
    top: Math.max(0, ...layers.map(({ height }) => height)),
    length: layers.reduce((sum, { width }) => sum + width, 0),
    opacity: (energy) =>
      layers.reduce(
        (sum, { width, height, mass: inside }) => sum + width * wavenumberOf(height - energy, inside),
        0,
      ),
    closedForm: slabs(layers.map((layer) => ({ ...layer, mass: layer.mass * ELECTRON_MASS }))),
  };
}
