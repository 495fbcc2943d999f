import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { type Report, type ReportedValue, reportPaper } from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";

const folder = join(import.meta.dirname, "../../db/specimen");
const paper = readPaper(
  readFileSync(join(folder, "paper.md"), "utf8"),
  readFileSync(join(folder, "bibliography.bib"), "utf8"),
);

function value(report: Report, cell: string, name: string): number {
  const found = report.cells[cell];
  const reported: ReportedValue | undefined = found?.status === "computed" ? found.values[name] : undefined;
  if (reported === undefined || !("value" in reported))
    throw new Error(`${cell}.${name} is ${JSON.stringify(reported)}`);
  return reported.value;
}

/** Middle and ends of each scale, and mixed corners. */
const SETTINGS = [
  {},
  { mu: "1.45" },
  { mu: "4" },
  { beta: "1/2" },
  { x_0: "0.1" },
  { x_0: "2" },
  { last: "200" },
  { last: "2000" },
  { mu: "1.45", beta: "1", x_0: "2", last: "2000" },
  { mu: "4", beta: "0.5", x_0: "2", last: "2000" },
  { mu: "4", beta: "0.5", x_0: "0.1", last: "200" },
] as const;

describe("the specimen paper", { timeout: 60_000 }, () => {
  test("it is read without a problem, and cites all that it lists", () => {
    expect(paper.problems).toEqual([]);
    expect(paper.bibliography.filter(({ number }) => number === null).map(({ key }) => key)).toEqual([]);
    for (const { email } of paper.front.authors) expect(email).toMatch(/\.example$/);
  });

  test("it shows every kind of cell there is, and every environment of a proof", () => {
    const kinds = new Set(paper.cells.map(({ kind }) => kind));
    for (const kind of [
      ...["parameters", "process", "profile", "counts", "tail", "simulate", "figure", "table", "formula"],
      ...["check", "sweep", "solve"],
    ]) {
      expect(kinds.has(kind), kind).toBe(true);
    }
    for (const word of [":::definition", ":::theorem", ":::proposition", ":::proof", ":::remark", "[^d]:"]) {
      expect(paper.text).toContain(word);
    }
  });

  test.each(SETTINGS)("with %j everything computes and its sentences are true", (overrides) => {
    const report = reportPaper(paper, overrides);
    expect(report.problems).toEqual([]);
    for (const number of report.numbers) expect(number.text, number.formula).not.toBe(undefined);
    const mu = value(report, "parameters@22", "mu");
    const beta = value(report, "parameters@22", "beta");
    const x = value(report, "parameters@22", "x_0");
    const s0 = value(report, "w", "s0");
    // Equation (1): the current is at least critical.
    expect(mu).toBeGreaterThanOrEqual(Math.sqrt(2 * beta));
    // Proposition 2.1, E K = exp(-lambda x).
    const lambda = mu + Math.sqrt(mu * mu - 2 * beta);
    expect(value(report, "K", "mean") / Math.exp(-lambda * x)).toBeCloseTo(1, 12);
    // Theorem 3.1, 1 - w(x, 0) <= exp(-lambda x).
    expect(1 - value(report, "K", "zero")).toBeLessThanOrEqual(Math.exp(-lambda * x));
    // Proposition 3.2, 1 < s0 <= 4 mu²/beta - 1; at the critical current a number that does not depend on beta.
    expect(s0).toBeGreaterThan(1);
    expect(s0).toBeLessThanOrEqual((4 * mu * mu) / beta - 1);
    // Computed by an independent method: high-precision series, 30 digits, here to 8 decimals.
    expect(value(report, "onset", "s0")).toBeCloseTo(1.34865038, 8);
    // Theorem 4.1: C = -w'(x, s0)/(2 sqrt(pi beta (s0 - 1))), and the law far out.
    const constant = -value(report, "T", "slope_at_start") / (2 * Math.sqrt(Math.PI * beta * (s0 - 1)));
    expect(value(report, "T", "constant") / constant).toBeCloseTo(1, 11);
    expect(Math.abs(value(report, "T", "ratio") - 1)).toBeLessThan(0.05);
    // What the paper claims of its own numbers, it checks: the tail law far out, and the drawn families.
    for (const check of ["beyond", "drawn"]) {
      const found = report.cells[check];
      expect(found?.status === "computed" && found.values.verdict, check).toEqual({ text: "holds" });
    }
    // A family that arrives has at least one settler; from far out 1/B of them.
    expect(value(report, "arrival", "given")).toBeGreaterThanOrEqual(1);
    expect(value(report, "arrival", "far") * value(report, "w", "amplitude")).toBeCloseTo(1, 12);
  });

  test("the turning value grows with the current", () => {
    const values = [1.45, 1.5, 1.6, 2, 2.5, 3, 3.5, 4].map((mu) =>
      value(reportPaper(paper, { mu: String(mu) }), "w", "s0"),
    );
    expect([...values].sort((a, b) => a - b)).toEqual(values);
  });
});
