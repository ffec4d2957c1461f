import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { concise } from "../../src/units/concise.js";

describe("concise notation (JCGM 100:2008, 7.2.2)", () => {
  test.each([
    [0.0266229041, 7.2e-10, "0.0266229041(8)"],
    [0.0266229, 3.1e-9, "0.026622900(4)"],
    [2.542248872950885e-14, 3e-18, "2.5422(4)e-14"],
    [-0.0266229, 3.1e-9, "-0.026622900(4)"],
    [1.23456, 0.00195, "1.2346(20)"],
    [0.5, 0.0012, "0.5000(12)"],
    [0.5, 0, "0.5(0)"],
    [0, 0, "0(0)"],
    [100, 0, "100(0)"],
    // 0.1 is no double: what is printed differs from the value held, and the bound says so.
    [0.1, 0, "0.10000000000000001(1)"],
    [1, 1e-300, "1.0000000000000000(1)"],
    [0, 5e-11, "0(6)e-11"],
    [3e-12, 5e-11, "0(6)e-11"],
    [1e-7, 2e-3, "0.000(3)"],
    [0.3, 1.2, "0.3(1.2)"],
    [9.97, 0.097, "9.97(10)"],
    [0.9999999, 0.05, "1.00(6)"],
    [1234, 50, "1230(60)"],
    [12.34, 95, "10(100)"],
    [1234567, 50, "1.23457(6)e6"],
    [0.5, 1e300, "0.0(1.1)e300"],
    [5e-324, 5e-324, "5(5)e-324"],
    [0.02662204, Number.POSITIVE_INFINITY, "0.02662(unbounded)"],
    [0.5, Number.NaN, "0.5(unbounded)"],
    [Number.NaN, 1, "NaN"],
  ])("%d with %d", (value, error, text) => {
    expect(concise(value, error)).toBe(text);
  });

  test("takes the number of digits asked for", () => {
    expect(concise(0.0266229041, 7.21e-10, { digits: 2 })).toBe("0.02662290410(73)");
    expect(concise(0.5, 0.0012, { digits: 1 })).toBe("0.500(2)");
  });

  test("refuses a negative bound", () => {
    expect(() => concise(1, -1e-9)).toThrow(RangeError);
  });
});

/** A text of the notation as exact integers in units of 10^place. */
function read(text: string): { value: bigint; bound: bigint; place: number } {
  const [, digits, bound, power = "0"] = /^(-?[\d.]+)\(([\d.]+)\)(?:e(-?\d+))?$/.exec(
    text,
  ) as RegExpExecArray;
  const decimals = (digits.split(".")[1] ?? "").length;
  // A bound with a point of its own has the value's decimals; one without counts in the last digit, or from the units.
  return {
    value: BigInt(digits.replace(".", "")),
    bound: BigInt(bound.replace(".", "")),
    place: Number(power) - decimals,
  };
}

/** A double as an exact count of 2^-1074, the smallest double. */
function exact(x: number): bigint {
  const bits = new DataView(new ArrayBuffer(8));
  bits.setFloat64(0, x);
  const word = bits.getBigUint64(0);
  const exponent = Number((word >> 52n) & 0x7ffn);
  const fraction = word & 0xfffffffffffffn;
  const size = exponent === 0 ? fraction : (fraction | 0x10000000000000n) << BigInt(exponent - 1);
  return x < 0 ? -size : size;
}

test("the printed bound is never smaller than the true one, the rounding of the value included", () => {
  const value = fc.oneof(
    fc.double({ min: -1, max: 1, noNaN: true }),
    fc.double({ noNaN: true, noDefaultInfinity: true }),
    fc.double({ min: 0, max: 1, noNaN: true }).map((x) => 10 ** (-40 * x)),
  );
  const error = fc.oneof(
    fc.double({ min: 0, noNaN: true, noDefaultInfinity: true }),
    fc.double({ min: 0, max: 1, noNaN: true }).map((x) => 10 ** (-40 * x)),
  );
  fc.assert(
    fc.property(value, error, fc.constantFrom(undefined, 1, 2, 3), (v, e, digits) => {
      const printed = read(concise(v, e, { digits }));
      // Everything times 10^-place (if that is whole) times 2^1074, so that the comparison is one of integers.
      const up = 10n ** BigInt(Math.max(0, -printed.place));
      const down = 10n ** BigInt(Math.max(0, printed.place));
      const inTicks = (x: bigint): bigint => x * down * (1n << 1074n);
      const difference = inTicks(printed.value) - exact(v) * up;
      const distance = difference < 0n ? -difference : difference;
      expect(distance + exact(e) * up <= inTicks(printed.bound)).toBe(true);
    }),
    { numRuns: 3000 },
  );
});

test("the printed bound is at most 1.75 times the true one", () => {
  // One digit of 2 or more: at most a unit for rounding up and half a unit for the value, a unit being half the bound.
  const value = fc.double({ min: -1, max: 1, noNaN: true });
  const error = fc.double({ min: 0, max: 13, noNaN: true }).map((x) => 10 ** -x);
  fc.assert(
    fc.property(value, error, (v, e) => {
      const { bound, place } = read(concise(v, e));
      expect(Number(bound) * 10 ** place).toBeLessThanOrEqual(1.75 * e * (1 + 1e-12));
    }),
    { numRuns: 3000 },
  );
});
