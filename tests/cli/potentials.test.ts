import { readdirSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { shapes } from "../../src/potentials/registry.js";
import { root, workplace } from "./run.js";

const { postern, shell, write } = workplace();
const READY_MADE = readdirSync(join(root, "potentials"))
  .filter((file) => file.endsWith(".yaml"))
  .map((file) => file.replace(/\.yaml$/, ""));
const SHAPES = shapes.map(({ name }) => name);

describe("postern potentials", () => {
  it("lists every ready-made potential and every shape", () => {
    const { code, out, err } = postern("potentials");
    expect({ code, err }).toEqual({ code: 0, err: "" });
    for (const name of [...READY_MADE, ...SHAPES])
      expect(out).toMatch(new RegExp(`^ {2}${name} {2,}\\S`, "m"));
    expect(out.split("\n").filter((line) => line.length > 100)).toEqual([]);
  });

  it("prints the list as one JSON document", () => {
    const { readyMade, shapes: listed } = JSON.parse(postern("potentials", "--json").out);
    expect(readyMade.map(({ name }: { name: string }) => name).sort()).toEqual([...READY_MADE].sort());
    expect(listed.map(({ name }: { name: string }) => name)).toEqual(SHAPES);
  });

  it("shows one in full: formula, parameters, source, values to check against, and the profile", () => {
    const { code, out } = postern("potentials", "gaas-algaas-double-barrier");
    expect(code).toBe(0);
    expect(out).toMatchInlineSnapshot(`
      "Double barrier of AlGaAs in GaAs, 3/5/3 nm
      gaas-algaas-double-barrier

      Two Al(0.3)Ga(0.7)As walls of 3 nm around a 5 nm GaAs well. Its lowest resonance stands at 0.0765 eV
      and is 3.3 meV wide: a packet that is spread more than that in energy is let through in part only.

      shape         layers
      formula       V(x) = height of the layer that x lies in, the first one starting at x = 0; 0 outside
                    the stack
      mass          0.067 m_e, unless the design gives another
      source        masses and offset: I. Vurgaftman, J. R. Meyer, L. R. Ram-Mohan, J. Appl. Phys. 89,
                    5815 (2001); widths: common practice, no source
      of the shape  D. J. BenDaniel and C. B. Duke, Phys. Rev. 152, 683 (1966): psi and (1/m) dpsi/dx are
                    continuous where the mass jumps

      parameters, to be changed by "with"
        well     5 nm        potential.layers[1].width
        barrier  3 nm        potential.layers[0].width and potential.layers[2].width
        first    3 nm        potential.layers[0].width
        second   3 nm        potential.layers[2].width
        height   0.2591 eV   potential.layers[0].height and potential.layers[2].height
        mass     0.0919 m_e  potential.layers[0].mass and potential.layers[2].mass

      profile
        0.259 eV ┤           ██████████                  ██████████
                 │           ██████████                  ██████████
                 │           ██████████                  ██████████
                 │           ██████████                  ██████████
                 │           ██████████                  ██████████
                 │           ██████████                  ██████████
                 │           ██████████                  ██████████
                 │           ██████████                  ██████████
                 │           ██████████                  ██████████
            0 eV ┤▁▁▁▁▁▁▁▁▁▁▁██████████▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁▁██████████▁▁▁▁▁▁▁▁▁▁▁
                 └───────────┴────────────────────────────────────────────────
                  -3.3 nm    0                                         14.3 nm

      transmission to check against
        0.05 eV       plane wave             0.001373697640681958(11)
        0.0765418 eV  plane wave             1.0000000000(11)
        0.2 eV        plane wave             0.02060747175327526(11)
        0.0765418 eV  packet of width 30 nm  0.2523227921353453(11)
        from: transfer matrix at 50 digits, computed for this file
        from: transfer matrix averaged over the packet's momenta, computed for this file

      in a design
        potential: { use: gaas-algaas-double-barrier }
      "
    `);
  });

  it.each([...READY_MADE, ...SHAPES])(
    "%s has formula, source and a drawing, and a design can take it",
    (name) => {
      const { code, out, err } = postern("potentials", name);
      expect({ code, err }).toEqual({ code: 0, err: "" });
      expect(out).toMatch(/^formula +V\(x\) = /m);
      expect(out).toMatch(/^source +\S/m);
      expect(out).toMatch(/^ +└─+┴?─*$/m);
      expect(out.split("\n").filter((line) => line.length > 100)).toEqual([]);
      const use = /^ {2}(potential: .*)$/m.exec(out)?.[1];
      const energy = /harmonic|image/.test(name) ? "0.15 eV" : "100 keV";
      write("use.yaml", `title: Use\n${use}\npacket: { energy: ${energy}, width: 10 nm }\n`);
      expect(postern("validate", "use.yaml").out).toContain("title: Use");
    },
  );

  it("shows a file of one's own", () => {
    write(
      "mine.yaml",
      "name: mine\ntitle: My barrier\nsummary: Mine.\nsource: common practice, no source\npotential: { shape: rectangular, height: 1 eV, width: 1 nm }\n",
    );
    const { code, out } = postern("potentials", "mine.yaml", "--json");
    expect(code).toBe(0);
    expect(JSON.parse(out)).toMatchObject({ name: "mine", title: "My barrier", shape: "rectangular" });
  });

  it("suggests the nearest name", () => {
    expect(postern("potentials", "ekart")).toEqual({
      code: 2,
      out: "",
      err:
        'postern: no ready-made potential and no shape of that name: got "ekart"; did you mean "eckart"?\n' +
        'Run "postern potentials" for the list.\n',
    });
  });

  it("draws with plain characters where the locale has no others", () => {
    // biome-ignore lint/suspicious/noControlCharactersInRegex: ASCII is what is looked for
    const plain = /^[\u0000-\u007f]*$/;
    const [ascii, unicode] = ["C", "C.UTF-8"].map((locale) =>
      shell(`LC_ALL=${locale} postern potentials eckart`),
    );
    expect(ascii.code).toBe(0);
    expect(ascii.out).toMatch(plain);
    expect(unicode.out).not.toMatch(plain);
  });
});
