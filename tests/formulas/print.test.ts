import fc from "fast-check";
import { describe, expect, test } from "vitest";
import {
  approximate,
  decimalText,
  exact,
  type PrintOptions,
  printNumber,
  type Quantity,
  scaled,
} from "../../app/formulas/index.ts";
import { quantityOf } from "./evaluating.ts";
import { atMost, decimal, fractionOf, minus, plus, size, times } from "./fraction.ts";

const text = (q: Quantity, options: PrintOptions = {}): string => printNumber(q, options).text;
const NBSP = "\u00a0";

describe("exact numbers", () => {
  test.each<[number, PrintOptions, string]>([
    [1.6, {}, "1.6"],
    [200, {}, "200"],
    [200, { digits: 2 }, "200"],
    [1e9, {}, "1000000000"],
    [2 ** 53, {}, "9007199254740992"],
    [-2.5, {}, "\u22122.5"],
    [0, {}, "0"],
    [0, { decimals: 2 }, "0.00"],
    [1.6, { digits: 4 }, "1.600"],
    [1.6, { decimals: 3 }, "1.600"],
    [Math.SQRT2, {}, "1.41421"],
    [0.00012, {}, "0.00012"],
    [0.000012, {}, "1.2×10⁻⁵"],
    [1234567.5, {}, "1.23457×10⁶"],
    [123456.7, { digits: 3 }, "1.23×10⁵"],
    [123456.7, { digits: 3, as: "plain" }, "123000"],
    [12345678, { as: "scientific" }, "1.23457×10⁷"],
    [1e20, {}, "1×10²⁰"],
    [0.05, { as: "percent" }, `5${NBSP}%`],
    [1.6, { unit: "km^2 yr^-1" }, `1.6${NBSP}km² yr⁻¹`],
  ])("%d %j prints as %s", (x, options, wanted) => {
    expect(text(exact(x), options)).toBe(wanted);
  });
});

describe("computed numbers print what is known of them", () => {
  test.each<[number, number, PrintOptions, string, string]>([
    // value, error, options, text, unsupported
    [5.43688, 1e-12, {}, "5.43688", ""],
    [5.43688, 3e-3, {}, "5.44", ""],
    [5.43688, 3e-3, { digits: 6 }, "5.44", "688"],
    [5.43688, 5e-3, { digits: 6 }, "5.44", "688"],
    [5.43688, 5.001e-3, { digits: 6 }, "5.4", "3688"],
    [0.00187142, 3e-5, { digits: 6 }, "0.0019", "7142"],
    [0.5, 1e-15, {}, "0.500000", ""],
    [9.9996, 1e-12, { digits: 4 }, "10.00", ""],
    [999999.7, 1e-9, {}, "1.00000×10⁶", ""],
    [123456, 70, {}, "1.23×10⁵", ""],
    [123456, 70, { digits: 6 }, "1.23×10⁵", "456"],
    [0.1312345, 1e-9, { as: "percent", digits: 3 }, `13.1${NBSP}%`, ""],
    [12.3, 1e-10, { as: "scientific", digits: 3 }, "1.23×10¹", ""],
    [1e-5, 1e-6, { decimals: 3 }, "0.000", ""],
    [0, 1e-16, { decimals: 3 }, "0.000", ""],
    [2, 0.3, { decimals: 2 }, "2", ".00"],
    [0.96, 0.3, {}, "1", ""],
    [1e-18, 1e-16, { digits: 3 }, "no digit known", "1.00×10⁻¹⁸"],
    [0, 1e-16, {}, "no digit known", "0"],
  ])("%d ± %d %j", (x, error, options, wanted, unsupported) => {
    const printed = printNumber(approximate(x, error), options);
    expect([printed.text, printed.unsupported]).toEqual([wanted, unsupported]);
  });

  test("how many digits are supported", () => {
    const supported = (x: number, error: number): number => printNumber(approximate(x, error)).supported;
    expect([supported(5.43688, 3e-3), supported(5.43688, 0), supported(1e-18, 1e-16)]).toEqual([3, Infinity, 0]);
  });

  test("the sheet shows what is known and what is asked, together one number", () => {
    const { sheet } = printNumber(approximate(0.00187142, 3e-7), { digits: 6 });
    expect(sheet).toEqual({ known: "0.001871", unknown: "42", rest: "" });
    expect(printNumber(scaled(0.7, -2460, 0.7e-3), { digits: 6 }).sheet).toEqual({
      known: "2.04",
      unknown: "790",
      rest: "×10⁻⁷⁴¹",
    });
  });

  test("TeX and siunitx", () => {
    const printed = printNumber(quantityOf("2.58*10^-741"), { digits: 3 });
    expect([printed.text, printed.tex, printed.siunitx]).toEqual([
      "2.58×10⁻⁷⁴¹",
      "2.58\\times10^{-741}",
      "\\num{2.58e-741}",
    ]);
    expect(printNumber(exact(-1.5), { unit: "50% {km}" }).tex).toBe("-1.5\\,\\mathrm{\\text{50   km }}");
    expect(printNumber(exact(0.5), { as: "percent" }).tex).toBe("50\\,\\%");
  });
});

describe("standard errors", () => {
  test.each<[number, number, PrintOptions, string]>([
    // 20.16(56) and 11.4(3) are the customary short form, BIPM, GUM (2008), 7.2.2.
    [11.43, 0.31, { withError: true }, "11.4(3)"],
    [20.16, 0.56, { withError: true, digits: 4 }, "20.16(56)"],
    [11.43, 0.123, { withError: true }, "11.43(12)"],
    [2.583e-5, 3.1e-7, { withError: true }, "2.58(3)×10⁻⁵"],
    [1234, 31, { withError: true }, "1.23(3)×10³"],
    [0.52, 1.23, { withError: true }, "0.5(1.2)"],
    [11.37, 0.3, {}, "11"],
  ])("%d with se %d", (x, se, options, wanted) => {
    expect(text(approximate(x, 0, se), options)).toBe(wanted);
  });

  test("without a standard error there is nothing to put in brackets", () => {
    expect(text(exact(1.6), { withError: true })).toBe("1.6");
  });
});

describe("properties", () => {
  const number = fc.double({ min: 1e-12, max: 1e12, noNaN: true });
  const width = fc.integer({ min: -45, max: -1 }).map((k) => 2 ** k);
  const asDecimal = (shown: string): string =>
    shown.replace("\u2212", "-").replace(
      /×10([⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+)/,
      (_, power: string) =>
        `e${[...power]
          .map((c) => "⁻⁰¹²³⁴⁵⁶⁷⁸⁹".indexOf(c))
          .map((i) => (i === 0 ? "-" : String(i - 1)))
          .join("")}`,
    );

  test("what is printed is within one unit of its last digit of every number the bound allows", () => {
    fc.assert(
      fc.property(number, width, fc.integer({ min: 1, max: 15 }), (x, w, digits) => {
        const q = approximate(x, x * w);
        const printed = printNumber(q, { digits });
        fc.pre(printed.supported > 0);
        const shown = asDecimal(printed.text);
        const [, mantissa = "", exponent = "0"] = /^([^e]+)(?:e(.+))?$/.exec(shown) ?? [];
        const decimals = mantissa.includes(".") ? mantissa.length - mantissa.indexOf(".") - 1 : 0;
        const unit = decimal(`1e${Number(exponent) - decimals}`);
        // An error of 0.05 means the decimal, not the double a hair above it.
        const error = decimal(String(q.error));
        const farthest = plus(size(minus(fractionOf(q), decimal(shown))), error);
        expect(atMost(farthest, times(unit, { over: 2n ** 50n + 1n, under: 2n ** 50n }))).toBe(true);
        // Half a unit belongs to the rounding, at most half to the error.
        expect(atMost(times(error, { over: 2n, under: 1n }), unit)).toBe(true);
      }),
      {
        numRuns: 1000,
        examples: [
          [1e-12, 0.5, 2],
          [1e-5, 0.5, 2],
          [0.1, 0.5, 3],
        ],
      },
    );
  });

  test("an exact number with 17 digits reads back as the same double", () => {
    fc.assert(
      fc.property(number, (x) => {
        expect(Number(asDecimal(text(exact(x), { digits: 17, as: "scientific" })))).toBe(x);
      }),
    );
  });

  test("known and unknown digits make up the number to all digits asked", () => {
    fc.assert(
      fc.property(number, width, (x, w) => {
        const { sheet } = printNumber(approximate(x, x * w), { digits: 8, as: "scientific" });
        const whole = printNumber(approximate(x, 0.49 * 10 ** (Math.floor(Math.log10(x)) - 9)), {
          digits: 8,
          as: "scientific",
        });
        if (sheet.unknown === "" || sheet.known === "") return;
        expect(Number(asDecimal(sheet.known + sheet.unknown + sheet.rest))).toBe(Number(asDecimal(whole.text)));
      }),
    );
  });
});

describe("a number as text for other programs", () => {
  // Computed by an independent method: decimal arithmetic of 60 digits, outside this program.
  test.each<[Quantity, number | undefined, string]>([
    [exact(0), undefined, "0"],
    [approximate(5.436877834061, 1e-12), undefined, "5.436877834061"],
    [approximate(5.436877834061, 1e-12), 2, "5.4"],
    [scaled(1, -3000, 0), undefined, "8.1285486255577354e-904"],
    [scaled(0.75, 4000, 0), undefined, "9.8865307007320733e1203"],
    [scaled(-5, -1100, 0), undefined, "-3.6810759145114313e-331"],
    [scaled(-5, -1100, 0), 2, "-3.7e-331"],
    [scaled(2 ** -10, -1000, 0), undefined, "9.1139025244454969e-305"],
  ])("%o to %s digits is %s", (q, digits, expected) => {
    expect(decimalText(q, digits)).toBe(expected);
  });

  test("digits that round up to a power of ten carry into the exponent", () => {
    // 9.99e-1000 = 9.99·10^-1000, rounded to one digit.
    const q = quantityOf("9.99*10^(-1000)");
    expect(decimalText(q, 1)).toBe("1e-999");
  });
});
