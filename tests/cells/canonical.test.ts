import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { canonicalJson, sha256 } from "../../app/cells/index.ts";

describe("canonical JSON", () => {
  test("RFC 8785, section 3.2.2: literals, strings and numbers", () => {
    const value = {
      numbers: [Number("333333333.33333329"), 1e30, 4.5, 2e-3, 1e-27],
      string: "\u20ac$\u000f\u000aA'\u0042\u0022\u005c\\\"/",
      literals: [null, true, false],
    };
    expect(canonicalJson(value)).toBe(
      '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
    );
  });

  test("RFC 8785, section 3.2.3: members in the order of their UTF-16 code units", () => {
    const names = ["\u20ac", "\r", "\ufb33", "1", "\ud83d\ude00", "\u0080", "\u00f6"];
    const value = Object.fromEntries(names.map((name) => [name, name]));
    const order = ["\r", "1", "\u0080", "\u00f6", "\u20ac", "\ud83d\ude00", "\ufb33"];
    expect(Object.keys(JSON.parse(canonicalJson(value)) as object).sort()).toEqual([...names].sort());
    expect(canonicalJson(value)).toBe(
      `{${order.map((name) => `${JSON.stringify(name)}:${JSON.stringify(name)}`).join(",")}}`,
    );
  });

  test("RFC 8785, appendix B: numbers at the ends of the double's range", () => {
    const samples: [number, string][] = [
      [-0, "0"],
      [5e-324, "5e-324"],
      [1.7976931348623157e308, "1.7976931348623157e+308"],
      [9007199254740992, "9007199254740992"],
      [295147905179352830000, "295147905179352830000"],
      [9.999999999999997e22, "9.999999999999997e+22"],
      [1e23, "1e+23"],
      [0.000001, "0.000001"],
      [333333333.33333325, "333333333.33333325"],
      [1424953923781206.2, "1424953923781206.2"],
    ];
    for (const [number, text] of samples) expect(canonicalJson(number)).toBe(text);
  });

  test("what JSON cannot hold is refused, never written as something else", () => {
    for (const value of [Number.NaN, Number.POSITIVE_INFINITY, "\ud800", undefined, 3n]) {
      expect(() => canonicalJson(value)).toThrow(TypeError);
    }
  });

  test("order of members does not matter, content does", () => {
    fc.assert(
      fc.property(fc.dictionary(fc.string(), fc.jsonValue()), (value) => {
        const reversed = Object.fromEntries(Object.entries(value).reverse());
        expect(canonicalJson(reversed)).toBe(canonicalJson(value));
        expect(JSON.parse(canonicalJson(value))).toEqual(JSON.parse(JSON.stringify(value)));
      }),
    );
  });
});

test("SHA-256 of FIPS 180-4's examples", () => {
  // Source: NIST, Cryptographic Standards, example values of SHA-256 for one block and for the empty message.
  expect(sha256("abc")).toBe("ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
  expect(sha256("")).toBe("e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855");
});
