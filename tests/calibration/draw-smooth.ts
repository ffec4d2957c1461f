import { eckart, sech2, smoothStep, type Transmission } from "../potentials/closed-forms.js";
import { DEEPEST_DECADES, type Drawn, drawMass, stepPacket } from "./draw-layered.js";
import { drawPacket, tailPacket } from "./draw-packet.js";
import { rounded, type Structure } from "./drawn-design.js";
import type { MixingGenerator } from "./mixing-generator.js";
import { scaleFor, wavenumberOf } from "./packet-guess.js";

/** How often each shape is drawn. */
export const SMOOTH_SHAPES = { sech2: 30, gaussian: 25, eckart: 25, step: 12 };
/** Least and greatest width of a shape, nm: the tunnels of 1e-20 fit in between. */
const NARROWEST = 0.1;
const WIDEST = 12;
const PATIENCE = 30;
/** Cells, and widths to either side, of the rough integral of kappa. */
const CELLS = 160;
const SIDES = 12;

/** V(x) in eV with x in widths, and what the design file calls it all. */
interface Shape {
  readonly name: string;
  readonly lines: readonly string[];
  readonly profile: (x: number) => number;
  readonly top: number;
  readonly levelRight: number;
  readonly closedForm?: (width: number) => Transmission;
}

export function drawSmooth(random: MixingGenerator): Drawn {
  const name = random.pick(SMOOTH_SHAPES);
  if (name === "step") return drawSmoothStep(random);
  return random.chance(0.7) ? drawTunnel(random, name) : drawOther(random, name);
}

/** A barrier as wide as a transmission drawn evenly over the decades asks for. */
function drawTunnel(random: MixingGenerator, name: "sech2" | "gaussian" | "eckart"): Drawn {
  const target = 10 ** -random.between(0, DEEPEST_DECADES);
  for (let draw = 1; ; draw++) {
    const shape = drawShape(random, name, random.between(0.05, 1.2));
    const mass = drawMass(random);
    const unscaled = structureOf("tunnel", shape, 1, mass);
    const packet = drawPacket(random, unscaled, "below");
    const width = scaleFor(unscaled, packet, target, NARROWEST, WIDEST);
    if (width === undefined && draw < PATIENCE) continue;
    return { structure: structureOf("tunnel", shape, rounded(width ?? 1), mass), packet };
  }
}

/** Wells, barriers passed above their top or at it, and barriers that a tail alone passes. */
function drawOther(random: MixingGenerator, name: "sech2" | "gaussian" | "eckart"): Drawn {
  const theme = random.pick({ above: 40, near: 25, tail: 15, well: name === "eckart" ? 0 : 20 });
  const height = theme === "well" ? random.between(-0.3, -0.02) : random.between(0.05, 1.2);
  const mass = drawMass(random);
  const shape = drawShape(random, name, height);
  const structure = structureOf(theme, shape, rounded(random.decades(0.3, 6)), mass);
  const from = random.chance(0.5) ? "left" : "right";
  const packet =
    theme === "tail"
      ? tailPacket(random, structure, from)
      : drawPacket(random, structure, theme === "near" ? "near" : "above");
  return { structure, packet };
}

function drawSmoothStep(random: MixingGenerator): Drawn {
  const mass = drawMass(random);
  const height = rounded((random.chance(0.5) ? 1 : -1) * random.decades(0.02, 1.2));
  const thickness = rounded(random.decades(0.05, 4));
  const structure: Structure = {
    theme: "step",
    potential: ["shape: step", `height: ${height} eV`, `thickness: ${thickness} nm`],
    mass,
    levelRight: height,
    top: Math.max(0, height),
    length: Math.max(4 * thickness, 2 / wavenumberOf(Math.abs(height), mass)),
    opacity: () => 0,
    closedForm: smoothStep(height, thickness),
  };
  return { structure, packet: stepPacket(random, structure) };
}

function drawShape(random: MixingGenerator, name: "sech2" | "gaussian" | "eckart", peak: number): Shape {
  const height = Number(peak.toFixed(4));
  const line = `height: ${height} eV`;
  if (name === "sech2")
    return {
      name,
      lines: [line],
      profile: (x) => height / Math.cosh(x) ** 2,
      top: Math.max(0, height),
      levelRight: 0,
      closedForm: (width) => sech2(height, width),
    };
  if (name === "gaussian")
    return {
      name,
      lines: [line],
      profile: (x) => height * Math.exp((-x * x) / 2),
      top: Math.max(0, height),
      levelRight: 0,
    };
  const drop = Number((random.between(-0.5, 0.6) * height).toFixed(4));
  const b = (Math.sqrt(height) + Math.sqrt(height - drop)) ** 2;
  return {
    name,
    lines: [line, `drop: ${drop} eV`],
    profile: (x) => {
      const y = Math.exp(x);
      return (drop * y) / (1 + y) + (b * y) / (1 + y) ** 2;
    },
    top: height,
    levelRight: drop,
    closedForm: (width) => eckart(height, drop, width),
  };
}

function structureOf(theme: string, shape: Shape, width: number, mass: number): Structure {
  const cell = (2 * SIDES) / CELLS;
  const profile = Array.from({ length: CELLS }, (_, i) => shape.profile(-SIDES + (i + 0.5) * cell));
  return {
    theme: `${shape.name} ${theme}`,
    potential: [`shape: ${shape.name}`, ...shape.lines, `width: ${width} nm`],
    mass,
    levelRight: shape.levelRight,
    top: shape.top,
    length: 4 * width,
    opacity: (energy) =>
      width * cell * profile.reduce((sum, value) => sum + wavenumberOf(value - energy, mass), 0),
    closedForm: shape.closedForm?.(width),
  };
}
