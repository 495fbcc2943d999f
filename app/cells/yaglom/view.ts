import type { Figure, Series, TableData } from "../../figures/index.ts";
import type { TailLaw } from "../../solvers/index.ts";
import { absorbedMoments, tailProbability } from "../../solvers/index.ts";
import { doubleProbability, log10Probability, probabilityAt } from "../counts/law.ts";
import { countsTable, stems } from "../counts/view.ts";
import { labelledAxis } from "../figure-parts.ts";
import type { Presentation } from "../presentation.ts";
import { plottedCounts, tabulatedCounts } from "../process/thinning.ts";
import { tableEntry } from "../table-parts.ts";
import type { CellView } from "../types.ts";
import { scaledValue, shortNumber } from "../values.ts";
import type { YaglomData } from "./model.ts";

/** The limit law as stems over n on a logarithmic axis, with the law of large n as a dotted reference. */
export function viewYaglom(data: YaglomData, presentation: Presentation): CellView {
  const { law, tail } = data;
  const plotted = plottedCounts(law.upTo).filter((n) => n >= 1);
  const thinned = plotted.length < law.upTo ? [`Of n = 1 to ${law.upTo}, ${plotted.length} are drawn.`] : [];
  const missing = "refused" in tail ? [tail.refused] : [];
  const figure: Figure = {
    alternative: alternative(data),
    x: labelledAxis("n", "linear", presentation.x),
    y: labelledAxis("P(Y=n)", "log", presentation.y),
    series: [stems(data, plotted, presentation.name, "Y"), ...("refused" in tail ? [] : [tailSeries(tail, plotted)])],
    levels: [],
    remarks: [...thinned, ...missing],
  };
  const rows = tabulatedCounts(law.upTo).filter((n) => n >= 1);
  return {
    figure,
    table: countsTable(data, rows, presentation.name, true, "Y"),
    points: pointsOf(data, plotted, presentation.name),
  };
}

function tailSeries(tail: TailLaw, plotted: readonly number[]): Series {
  const values = plotted.map((n) => tailProbability(tail, n).probability);
  return {
    name: "tail law",
    label: "tail law",
    labelAt: "end",
    mark: "line",
    role: "reference",
    x: plotted,
    y: values.map(doubleProbability),
    log10y: values.map(log10Probability),
  };
}

/** What is drawn, in numbers: the law and the law of large n beside it. */
function pointsOf(data: YaglomData, plotted: readonly number[], name: string | null): TableData {
  const { columns, rows, remarks } = countsTable(data, plotted, name, false, "Y");
  const { tail } = data;
  if ("refused" in tail) return { columns, rows, remarks };
  return {
    columns: [...columns, { name: "tail law", head: "C n^{-3/2} s_0^{-n}", tex: true }],
    rows: rows.map((row, index) => [
      ...row,
      tableEntry(scaledValue(tailProbability(tail, plotted[index] ?? 1).probability)),
    ]),
    remarks,
  };
}

/** Says the finding: how likely one is, how many there are on average, and by what law large numbers are reached. */
function alternative({ trajectory, law, tail }: YaglomData): string {
  const one = probabilityAt(law, 1);
  const chance = one === undefined ? "" : ` P(Y = 1) = ${shortNumber(doubleProbability(one))}`;
  const mean = `, E Y = ${shortNumber(absorbedMoments(trajectory, "far").mean.value)}.`;
  const large =
    "refused" in tail
      ? ""
      : ` For large n it is ${shortNumber(tail.constant.value)} n^(−3/2) ${shortNumber(tail.s0.value)}^(−n), drawn dotted.`;
  return `The limit law of K given K > 0 from far away, n = 1 to ${law.upTo}.${chance}${mean}${large}`;
}
