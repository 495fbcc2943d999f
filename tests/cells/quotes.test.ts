import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { type CellResult, computePlan, evaluateNumber, planPaper, viewCell } from "../../app/cells/index.ts";
import { type Figure, quoteOf, type Series, type TableData } from "../../app/figures/index.ts";
import { toDouble } from "../../app/formulas/index.ts";
import { readPaper } from "../../app/paper/index.ts";

const folder = join(import.meta.dirname, "../../db/specimen");
const SPECIMEN = readFileSync(join(folder, "paper.md"), "utf8");
/** Kinds that the specimen paper has not, or shows nothing of. */
const MORE = `
\`\`\`generating_function g
of: larvae
start: [x_0, 1]
\`\`\`

\`\`\`yaglom Y
of: larvae
up_to: 20
\`\`\`

\`\`\`figure along
over: {x: 0 to 2}
curves: {survives: "larvae.survival(x) + x^2", both: w}
\`\`\`

\`\`\`figure moved
over: {mu: [1.5, 2]}
curves: {decay: larvae.decay + mu}
\`\`\`

\`\`\`sweep two
over: {y: -1 to 2}
vary: {z: [1, 2]}
points: 5
record: {square: y^2 + z}
\`\`\`

\`\`\`counts
of: larvae
start: 1
\`\`\`
`;
const plan = planPaper(readPaper(`${SPECIMEN}\n${MORE}`, ""));
const results = new Map<string, CellResult>();
for (const [id, outcome] of computePlan(plan)) if (outcome.status === "computed") results.set(id, outcome.result);

function viewOf(id: string) {
  const [planned, result] = [plan.byId.get(id), results.get(id)];
  if (planned === undefined || result === undefined) throw new Error(`${id} was not computed.`);
  return viewCell(planned, result, plan, results);
}

function numberAt(formula: string): number {
  const { value } = evaluateNumber({ formula, options: {} }, plan, results);
  if (value.type !== "number") throw new Error(`${formula} is ${JSON.stringify(value)}`);
  return toDouble(value.quantity);
}

/** Formulas of a table's entries with the entries in full. */
function quotesOf(table: TableData | null): (readonly [string, string])[] {
  return (table?.rows ?? []).flatMap((row) =>
    row.flatMap(({ quote, full }) => (quote === undefined ? [] : [[quote, full] as const])),
  );
}

function seriesOf(figure: Figure | null): Series[] {
  if (figure === null) return [];
  return [...figure.series, ...(figure.panels ?? []).flatMap((panel) => seriesOf(panel.figure))];
}

/** A place is quoted to four digits: the curve may have moved so much by it, and a table is told in full. */
const TO_PLACE = 2e-3;

describe("what is quoted by pointing", () => {
  const named = ["K", "T", "S", "w", "g", "Y", "against", "currents", "three", "onward", "along", "two"];

  test.each(named)("an entry of a table of %s is what its formula is", (id) => {
    const { table, points } = viewOf(id);
    const quoted = quotesOf(table ?? points);
    expect(quoted.length, id).toBeGreaterThan(0);
    const places = points === null || table !== null;
    for (const [formula, full] of quoted.slice(0, 60)) {
      const apart = Math.abs(numberAt(formula) - Number(full));
      expect(apart, formula).toBeLessThanOrEqual(
        (places ? 1e-12 : TO_PLACE) * Math.max(1e-300, Math.abs(Number(full))),
      );
    }
  });

  test.each(["K", "S", "w", "g", "Y", "three", "onward", "along", "two"])(
    "a point of %s is what its formula is",
    (id) => {
      const all = seriesOf(viewOf(id).figure);
      const quoted = all.flatMap((series) =>
        series.x.flatMap((_, i) => {
          const formula = quoteOf(series, i);
          return formula === "" ? [] : [[formula, series.y[i] ?? Number.NaN] as const];
        }),
      );
      expect(quoted.length).toBeGreaterThan(0);
      for (const [formula, y] of quoted.filter((_, i) => i % 7 === 0))
        expect(Math.abs(numberAt(formula) - y), formula).toBeLessThanOrEqual(TO_PLACE * Math.max(1, Math.abs(y)));
    },
  );

  test("of several curves each has its own formula", () => {
    const formulas = seriesOf(viewOf("along").figure).map((series) => series.quote);
    expect(formulas[0]).toBe("larvae.survival(#) + #^2");
    expect(formulas.slice(1).every((formula) => typeof formula === "string" && formula.startsWith("w(#"))).toBe(true);
    expect(quoteOf({ ...seriesOf(viewOf("along").figure)[0], x: [-0.123456], y: [1] } as Series, 0)).toBe(
      "larvae.survival((-0.1235)) + (-0.1235)^2",
    );
  });

  test("an entry of a table is quoted by its column's formula, and by its row where a parameter is varied", () => {
    const formulas = (id: string) => quotesOf(viewOf(id).table).map(([formula]) => formula);
    expect(formulas("against").slice(6, 9)).toEqual(["K(3)", "T(3)", "K(3)/T(3)"]);
    expect(formulas("currents").slice(4, 6)).toEqual(["currents.decay(2)", "currents.arrives(2)"]);
  });

  test("where a parameter is varied, or the cell has no name, there is none", () => {
    expect(seriesOf(viewOf("moved").figure).map((series) => series.quote)).toEqual([undefined]);
    const unnamed = plan.cells.find(({ kind, cell }) => kind === "counts" && cell.name === null);
    const { table, figure } = viewOf(unnamed?.id ?? "");
    expect(quotesOf(table)).toEqual([]);
    expect(seriesOf(figure)[0]?.quote).toBeUndefined();
  });

  test("a gap is not quoted", () => {
    const series: Series = {
      name: "a",
      label: "",
      labelAt: "end",
      mark: "line",
      role: "ordinary",
      x: [1, 2],
      y: [null, 3],
      quote: "a(#)",
    };
    expect([0, 1, 2].map((i) => quoteOf(series, i))).toEqual(["", "a(2)", ""]);
  });
});
