import type { Potential } from "../potentials/potential.js";
import { formatQuantity } from "../units/quantity.js";
import type { Problem } from "./provenance.js";
import type { DesignData } from "./schema.js";

/** Contradictions between the packet's own values; each value is right by itself. */
export function packetProblem({ packet }: DesignData): Problem | undefined {
  const help =
    "width is the standard deviation of |psi|^2 in x; energySpread the standard deviation of the energy.";
  const { width, energySpread, energy } = packet;
  if (width === undefined && energySpread === undefined) {
    const problem = 'missing; either width, such as "12 nm", or energySpread, such as "10 meV", is needed';
    return { path: ["packet", "width"], problem, help, target: "parent" };
  }
  if (width !== undefined && energySpread !== undefined) {
    const problem = "either width or energySpread is needed, not both: each follows from the other";
    return { path: ["packet", "energySpread"], problem, help, target: "key" };
  }
  if (energySpread !== undefined && energy === 0) {
    const problem = "at an energy of zero no width follows from energySpread; give width instead";
    return { path: ["packet", "energySpread"], problem, help, target: "key" };
  }
  return undefined;
}

/** Contradictions between the packet and the potential: where it starts and whether its energy is enough. */
export function startProblem({ packet }: DesignData, potential: Potential): Problem | undefined {
  if (potential.confining) return undefined;
  const { from, energy, start } = packet;
  const left = from === "left";
  const near = left ? potential.levelLeft : potential.levelRight;
  const far = left ? potential.levelRight : potential.levelLeft;
  const [nearSide, farSide] = left ? ["left", "right"] : ["right", "left"];
  if (near === Number.POSITIVE_INFINITY) {
    const problem = `a packet cannot come from the ${nearSide}: the potential rises without limit there`;
    return { path: ["packet", "from"], problem, help: `Write from: ${farSide}.`, target: "value" };
  }
  const needed = Math.max(0, Number.isFinite(far) ? far - near : 0);
  if (!(energy > needed)) {
    const got = `got "${formatQuantity(energy, "energy")}"`;
    const level = formatQuantity(needed, "energy");
    const problem =
      needed === 0
        ? `an energy above zero is needed, such as "0.15 eV"; ${got}`
        : `an energy above ${level} is needed, because the ${farSide} level of the potential lies ${level} above the ${nearSide} one; ${got}`;
    const help = `The energy is the kinetic energy at the start, counted from the ${nearSide} level.`;
    return { path: ["packet", "energy"], problem, help, target: "value" };
  }
  const face = potential.faces[left ? 0 : 1];
  if (start !== undefined && (left ? start >= face : start <= face)) {
    const edge = formatQuantity(face, "length", undefined, 6);
    const problem = `a start ${left ? "left" : "right"} of the structure, ${left ? "below" : "above"} ${edge}, is needed, as the packet comes from the ${from}; got "${formatQuantity(start, "length")}"`;
    return {
      path: ["packet", "start"],
      problem,
      help: "Leave start out to have it chosen.",
      target: "value",
    };
  }
  return undefined;
}
