import type { Figure, Series, TableData } from "../../figures/index.ts";
import { doubleProbability, log10Probability } from "../counts/law.ts";
import { labelledAxis } from "../figure-parts.ts";
import type { Presentation } from "../presentation.ts";
import { startWords } from "../process/start.ts";
import { tabulatedCounts } from "../process/thinning.ts";
import { tableEntry } from "../table-parts.ts";
import type { CellView } from "../types.ts";
import { exactValue, refusedValue, scaledValue, shortNumber } from "../values.ts";
import { numberOf, ratioOf } from "./law.ts";
import type { Comparison, TailData } from "./model.ts";
import { powerFigure } from "./power-view.ts";

/** Exact over asymptotic against n: what one term of the law is good for, and from which n on. */
export function viewTail(data: TailData, presentation: Presentation): CellView {
  const compared = data.compared.filter(({ exact }) => exact !== null);
  if (data.law.kind !== "square-root")
    return { ...tables(data, presentation.name), figure: powerFigure(data, compared, presentation) };
  const ratios = compared.map((comparison) => numberOf(ratioOf(comparison, data.missing)));
  const remarks = data.missing === null ? [] : [data.missing];
  const figure: Figure = {
    alternative: alternative(data),
    x: labelledAxis("n", "log", presentation.x),
    y: labelledAxis("exact over asymptotic", "linear", presentation.y),
    series: [
      {
        name: "exact over asymptotic",
        label: "",
        labelAt: "end",
        mark: "points",
        role: "ordinary",
        x: compared.map(({ n }) => n),
        y: ratios.map(({ ratio }) => ratio),
        low: ratios.map(({ ratio, error }) => ratio - error),
        high: ratios.map(({ ratio, error }) => ratio + error),
      },
    ],
    levels: [{ label: "1", y: 1 }],
    remarks,
  };
  return { ...tables(data, presentation.name), figure };
}

function tables(data: TailData, name: string | null): Omit<CellView, "figure"> {
  const tabulated = new Set(tabulatedCounts(data.upTo));
  return {
    table: tailTable(
      data,
      data.compared.filter(({ n }) => tabulated.has(n)),
      name,
    ),
    points: tailTable(data, data.compared, name),
  };
}

/** Among other curves: the asymptotic law itself, over the n at which it was compared. */
export function drawnTail({ compared }: TailData, presentation: Presentation): readonly Series[] {
  return [
    {
      name: `${presentation.name ?? "T"}(n)`,
      label: "",
      labelAt: "end",
      mark: "line",
      role: "ordinary",
      x: compared.map(({ n }) => n),
      y: compared.map(({ law }) => doubleProbability(law)),
      log10y: compared.map(({ law }) => log10Probability(law)),
      ...(presentation.name === null ? {} : { quote: `${presentation.name}(#)` }),
    },
  ];
}

function tailTable(data: TailData, rows: readonly Comparison[], name: string | null): TableData {
  return {
    columns: [
      { name: "n", head: "n", tex: true },
      { name: "exact", head: "P(K=n)", tex: true },
      { name: "asymptotic", head: "asymptotic law", tex: false },
      { name: "ratio", head: "exact over asymptotic", tex: false },
    ],
    rows: rows.map((row) => [
      tableEntry(exactValue(row.n)),
      tableEntry(row.exact === null ? refusedValue("") : scaledValue(row.exact)),
      tableEntry(scaledValue(row.law), {}, name === null ? "" : `${name}(${row.n})`),
      tableEntry(ratioOf(row, data.missing)),
    ]),
    remarks: data.missing === null ? [] : [data.missing],
  };
}

function alternative(data: TailData): string {
  const { law, upTo } = data;
  const last = data.compared.find(({ n }) => n === upTo);
  const ratio = last === undefined ? Number.NaN : numberOf(ratioOf(last, data.missing)).ratio;
  const found = Number.isNaN(ratio) ? "" : ` At n = ${upTo} it is ${Number(ratio.toPrecision(6))}.`;
  return `P(K = n) over its asymptotic law ${shortNumber(law.constant.value)} n^(−3/2) ${shortNumber(law.s0.value)}^(−n), n = 1 to ${upTo}, for ${startWords(data.starts)}; it tends to 1.${found}`;
}
