import { describe, expect, it } from "vitest";
import { COARSE, RECTANGULAR, workplace } from "./run.js";

const { postern, write } = workplace();
write("rect.yaml", RECTANGULAR);
write("coarse.yaml", COARSE);

describe("postern validate", () => {
  it("prints the design in full, every choice with its reason, and the warnings", () => {
    const { code, out, err } = postern("validate", "rect.yaml");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    expect(out).toMatch(/^title: Rectangular barrier\nparticle:\n {2}mass: 0\.067 m_e\npotential:\n/);
    expect(out).toMatch(/\n {2}from: left\nnumerics:\n/);
    for (const name of ["stepper", "start", "time step", "end", "box length", "points"])
      expect(out).toMatch(new RegExp(`^# {3}${name} {2,}\\S.* {2}\\S`, "m"));
    expect(out).toMatch(/\n# No warnings\.\n$/);
    expect(out.split("\n").filter((line) => line.length > 100)).toEqual([]);
  });

  it("prints a design file: its text read again gives the same", () => {
    const { out } = postern("validate", "rect.yaml", "--set", "packet.energy=0.2 eV");
    write("again.yaml", out);
    expect(postern("validate", "again.yaml").out).toBe(out);
  });

  it("warns of forced numerics", () => {
    const { code, out } = postern("validate", "coarse.yaml");
    expect(code).toBe(0);
    expect(out).toMatch(/^# Warnings:\n# {3}- Numerics are forced: /m);
    expect(out).toMatch(/^# {3}spacing {2,}0\.4 nm {2,}as the design asks$/m);
  });

  it("prints one JSON document with --json, with the hash that estimate gives", () => {
    const { code, out, err } = postern("validate", "rect.yaml", "--json");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    const { design, choices, warnings } = JSON.parse(out);
    const estimated = JSON.parse(postern("estimate", "rect.yaml", "--json").out).design;
    expect({ title: design.title, sha256: design.sha256 }).toEqual(estimated);
    expect(design.full.packet).toEqual({ energy: "0.15 eV", width: "10 nm", from: "left" });
    for (const choice of choices)
      expect(choice).toEqual({
        name: expect.any(String),
        value: expect.anything(),
        unit: expect.any(String),
        why: expect.any(String),
      });
    expect(choices[0]).toMatchObject({ name: "stepper", value: "crank-nicolson" });
    expect(warnings).toEqual([]);
  });
});
