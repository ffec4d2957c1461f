import { sha256 } from "@noble/hashes/sha2.js";
import { bytesToHex, utf8ToBytes } from "@noble/hashes/utils.js";
import { stringify } from "yaml";
import type { ParameterValue, QuantityParameter, ShapeParameter } from "../potentials/shape.js";
import { usualUnit } from "../units/format-quantity.js";
import { formatQuantity, type QuantityKind } from "../units/quantity.js";
import { NUMERICS_FIELDS, PACKET_FIELDS, PARTICLE_FIELDS } from "./fields.js";
import type { ReadDesignOptions } from "./options.js";
import { type ResolvedDesign, resolveDesign } from "./resolve.js";
import { shapeParameters } from "./schema.js";

/** Values of a design file: quantity texts, numbers, and lists and maps of them. */
export type DesignValue = string | number | readonly DesignValue[] | { readonly [key: string]: DesignValue };

/** A design written out in full. */
export interface DesignDescription {
  /** As a JSON file would hold it: `use`, options and defaults resolved, quantities as text. */
  readonly design: { readonly [key: string]: DesignValue };
  /** The same as YAML text, which reads back as the same design. */
  readonly yaml: string;
  readonly sha256: string;
}

/** Writes a design out in full. Takes the arguments of `readDesign`. @throws DesignError */
export function describeDesign(text: string, options: ReadDesignOptions = {}): DesignDescription {
  return describeResolved(resolveDesign(text, options));
}

/** The same for a design that is already resolved. */
export function describeResolved(resolved: ResolvedDesign): DesignDescription {
  const design = written(resolved, (value, kind) => formatQuantity(value, kind));
  return { design, yaml: stringify(design, { lineWidth: 0 }), sha256: canonicalSha256(resolved) };
}

/**
 * SHA-256 of a design's canonical form, 64 hex digits: JSON without spaces, keys sorted, `use`, options and defaults
 * resolved, every quantity in the usual unit of its kind (nm, eV, fs, m_e, ...) with the fewest digits that tell it apart.
 * Two files that state the same problem in other words thus have the same hash.
 */
export function canonicalSha256(resolved: ResolvedDesign): string {
  const design = written(resolved, (value, kind) => formatQuantity(value, kind, usualUnit(kind)));
  return bytesToHex(sha256(utf8ToBytes(JSON.stringify(sorted(design)))));
}

type Write = (value: number, kind: QuantityKind) => string;
type Entry = readonly [string, DesignValue];

function written({ data, shape }: ResolvedDesign, write: Write): { readonly [key: string]: DesignValue } {
  const { energy, width, energySpread, from, start } = data.packet;
  const parameters = Object.entries(shapeParameters(shape)).flatMap(([name, parameter]) =>
    parameterEntry(name, parameter, data.potential[name], write),
  );
  return {
    title: data.title,
    particle: Object.fromEntries(quantityEntries(data.particle, PARTICLE_FIELDS, write)),
    potential: { shape: data.potential.shape, ...Object.fromEntries(parameters) },
    packet: {
      ...Object.fromEntries(quantityEntries({ energy, width, energySpread }, PACKET_FIELDS, write)),
      from,
      ...Object.fromEntries(quantityEntries({ start }, PACKET_FIELDS, write)),
    },
    numerics: Object.fromEntries(
      Object.entries(data.numerics).flatMap(([name, value]): Entry[] => {
        if (value === undefined) return [];
        const field = NUMERICS_FIELDS[name];
        return [[name, field === undefined ? value : write(value as number, field.kind)]];
      }),
    ),
  };
}

function parameterEntry(
  name: string,
  parameter: ShapeParameter,
  value: ParameterValue,
  write: Write,
): Entry[] {
  if (value === undefined) return [];
  if (parameter.kind !== "list") return [[name, write(value as number, parameter.kind)]];
  const records = value as readonly Readonly<Record<string, number | undefined>>[];
  return [
    [name, records.map((record) => Object.fromEntries(quantityEntries(record, parameter.fields, write)))],
  ];
}

/** The fields that have a value, in the order of the table. */
function quantityEntries(
  values: Readonly<Record<string, number | undefined>>,
  fields: Readonly<Record<string, QuantityParameter>>,
  write: Write,
): Entry[] {
  return Object.entries(fields).flatMap(([name, { kind }]): Entry[] => {
    const value = values[name];
    return value === undefined ? [] : [[name, write(value, kind)]];
  });
}

function sorted(value: DesignValue): DesignValue {
  if (Array.isArray(value)) return value.map(sorted);
  if (typeof value !== "object") return value;
  const entries = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1));
  return Object.fromEntries(entries.map(([key, part]) => [key, sorted(part)]));
}
