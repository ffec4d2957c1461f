import { ELECTRON_MASS, HBAR } from "../../src/units/constants.js";
import type { DrawnPacket, Structure } from "./drawn-design.js";

const SAMPLES = 160;
/** Spreads of k to either side: exp(-11^2/2) = 5e-27 is left out, below the deepest transmission that is drawn. */
const REACH = 11;
/** Halvings of the scale's logarithm: to better than a per cent. */
const HALVINGS = 14;

/** Wavenumber (1/nm) of kinetic energy (eV) at mass (m_e). */
export function wavenumberOf(energy: number, mass: number): number {
  return Math.sqrt(2 * mass * ELECTRON_MASS * Math.max(0, energy)) / HBAR;
}

/**
 * Scale of the structure's lengths between two others at which about the target is transmitted; undefined when none is. For aiming
 * a draw alone: exp(-2 scale integral kappa dx) averaged over the packet's momenta, nothing below either level.
 */
export function scaleFor(
  structure: Structure,
  packet: DrawnPacket,
  target: number,
  low: number,
  high: number,
): number | undefined {
  const components = componentsOf(structure, packet);
  const at = (scale: number) =>
    components.reduce((sum, { weight, opacity }) => sum + weight * Math.exp(-2 * scale * opacity), 0);
  if (at(low) < target || at(high) > target) return undefined;
  let [a, b] = [low, high];
  for (let i = 0; i < HALVINGS; i++) {
    const middle = Math.sqrt(a * b);
    if (at(middle) > target) a = middle;
    else b = middle;
  }
  return a;
}

interface Component {
  /** Probability. */
  readonly weight: number;
  readonly opacity: number;
}

function componentsOf(structure: Structure, packet: DrawnPacket): Component[] {
  const near = packet.from === "left" ? 0 : structure.levelRight;
  const far = packet.from === "left" ? structure.levelRight : 0;
  const k0 = wavenumberOf(packet.energy, structure.mass);
  const spread = 1 / (2 * packet.width);
  const step = (2 * REACH) / SAMPLES;
  const components: Component[] = [];
  for (let i = 0; i <= SAMPLES; i++) {
    const z = -REACH + i * step;
    const k = k0 + z * spread;
    const energy = near + (HBAR * k) ** 2 / (2 * structure.mass * ELECTRON_MASS);
    if (k <= 0 || energy <= far) continue;
    const weight = (step * Math.exp(-0.5 * z * z)) / Math.sqrt(2 * Math.PI);
    components.push({ weight, opacity: structure.opacity(energy) });
  }
  return components;
}
