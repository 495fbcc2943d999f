import type { Figure, Series, TableData } from "../../figures/index.ts";
import { printNumber } from "../../formulas/index.ts";
import { labelledAxis } from "../figure-parts.ts";
import type { Presentation } from "../presentation.ts";
import { startWords } from "../process/start.ts";
import { plottedCounts, tabulatedCounts } from "../process/thinning.ts";
import { tableEntry } from "../table-parts.ts";
import type { CellView } from "../types.ts";
import { exactValue, scaledQuantity, scaledValue, shortNumber } from "../values.ts";
import { doubleProbability, log10Probability, probabilitiesAbove, probabilityAt } from "./law.ts";
import type { CountsData } from "./model.ts";

/** The law as stems over n, on a logarithmic axis unless `axes` says otherwise; the table has thinned rows. */
export function viewCounts(data: CountsData, presentation: Presentation): CellView {
  const plotted = plottedCounts(data.law.upTo);
  const remarks = plotted.length > data.law.upTo ? [] : [`Of n = 0 to ${data.law.upTo}, ${plotted.length} are drawn.`];
  const { name } = presentation;
  const figure: Figure = {
    alternative: alternative(data),
    x: labelledAxis("n", "linear", presentation.x),
    y: labelledAxis("P(K=n)", "log", presentation.y),
    series: [stems(data, plotted, name, "K")],
    levels: [],
    remarks,
  };
  return {
    figure,
    table: countsTable(data, tabulatedCounts(data.law.upTo), name, true),
    points: countsTable(data, plotted, name, false),
  };
}

/** A law as stems, each with its error. `name` is that of the cell; `letter` what is counted. */
export function stems(
  data: Pick<CountsData, "law">,
  plotted: readonly number[],
  name: string | null,
  letter: string,
): Series {
  const kept = plotted.flatMap((n) => {
    const probability = probabilityAt(data.law, n);
    return probability === undefined ? [] : [{ n, probability }];
  });
  const bound = (sign: 1 | -1) =>
    kept.map(({ probability: { mantissa, exponent, error } }) => (mantissa + sign * error) * 2 ** exponent);
  return {
    name: `${name ?? letter}(n)`,
    label: "",
    labelAt: "end",
    mark: "stems",
    role: "ordinary",
    x: kept.map(({ n }) => n),
    y: kept.map(({ probability }) => doubleProbability(probability)),
    log10y: kept.map(({ probability }) => log10Probability(probability)),
    low: bound(-1),
    high: bound(1),
    ...(name === null ? {} : { quote: `${name}(#)` }),
  };
}

/** Rows of a law; `name` is that of the cell, `letter` what is counted. */
export function countsTable(
  data: Pick<CountsData, "law" | "beyond">,
  rows: readonly number[],
  name: string | null,
  withAbove: boolean,
  letter = "K",
): TableData {
  const heads = ["n", `P(${letter}=n)`, `P(${letter}>n)`];
  const columns = heads.map((head) => ({ name: head, head, tex: true }));
  const beyond = withAbove ? (data.beyond ?? null) : null;
  const above = beyond === null ? null : probabilitiesAbove(data.law, beyond, rows);
  const entries = rows.map((n) => {
    const shown = [probabilityAt(data.law, n), ...(above === null ? [] : [above.get(n)])];
    return [
      tableEntry(exactValue(n)),
      ...shown.map((p, column) =>
        tableEntry(
          p === undefined ? { type: "none" } : scaledValue(p),
          {},
          name === null ? "" : `${name}${column === 0 ? "" : ".above"}(${n})`,
        ),
      ),
    ];
  });
  return { columns: above === null ? columns.slice(0, 2) : columns, rows: entries, remarks: [] };
}

/** Says the finding: how likely none is, and how fast the law falls at its end. */
function alternative(data: CountsData): string {
  const { law } = data;
  const none = probabilityAt(law, 0);
  const beforeLast = probabilityAt(law, law.upTo - 1);
  const last = probabilityAt(law, law.upTo);
  const zero = none === undefined ? "" : ` P(K = 0) = ${shortNumber(doubleProbability(none))}.`;
  const a = beforeLast === undefined ? null : log10Probability(beforeLast);
  const b = last === undefined ? null : log10Probability(last);
  const fall =
    last === undefined || a === null || b === null
      ? ""
      : ` At n = ${law.upTo} it is ${printNumber(scaledQuantity(last), { digits: 2 }).text}, falling by a factor of ${shortNumber(10 ** (a - b))} from the n before.`;
  return `The law of K for ${startWords(data.starts)}, n = 0 to ${law.upTo}.${zero}${fall}`;
}
