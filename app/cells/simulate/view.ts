import type { Figure, TableData } from "../../figures/index.ts";
import { exact, printNumber } from "../../formulas/index.ts";
import { labelledAxis } from "../figure-parts.ts";
import type { Presentation } from "../presentation.ts";
import { startWords } from "../process/start.ts";
import { tabulatedCounts } from "../process/thinning.ts";
import { tableEntry } from "../table-parts.ts";
import type { CellView } from "../types.ts";
import { exactValue, numberValue, shortNumber } from "../values.ts";
import { hitsOf, intervalOf } from "./callables.ts";
import { shareOf } from "./chance.ts";
import type { SimulateData } from "./model.ts";
import { isAtMost } from "./values.ts";

/** Above so many rings they hide one another. */
const MOST_PLOTTED = 120;
/** Of more, those up to here are all drawn. */
const ALL_TO = 40;

/** Shares as rings with bars over n, on a logarithmic axis unless `axes` says otherwise. */
export function viewSimulate(data: SimulateData, presentation: Presentation): CellView {
  const below = data.n.filter((n) => data.plan.cap === null || n < data.plan.cap);
  const plotted = thinned(below);
  const drawn =
    plotted.length < below.length ? [`Of ${below.length} values of K that occurred, ${plotted.length} are drawn.`] : [];
  const intervals = plotted.map((n) => intervalOf(data, n));
  const remarks = [...drawn, ...remarksOf(data)];
  const figure: Figure = {
    alternative: alternative(data, below),
    x: labelledAxis("n", "linear", presentation.x),
    y: labelledAxis("P(K=n)", "log", presentation.y),
    series: [
      {
        name: `${presentation.name ?? "K"}(n)`,
        label: "",
        labelAt: "end",
        mark: "points",
        role: "ordinary",
        x: plotted,
        y: plotted.map((n) => hitsOf(data, n) / data.plan.replicates),
        low: intervals.map(({ low }) => low),
        high: intervals.map(({ high }) => high),
        ...(presentation.name === null ? {} : { quote: `${presentation.name}(#)` }),
      },
    ],
    levels: [],
    remarks,
  };
  const { name } = presentation;
  const tabulated = tabulatedCounts(below.at(-1) ?? 0);
  return { figure, table: shareTable(data, tabulated, name, remarks), points: shareTable(data, plotted, name, []) };
}

/** All that occurred, or those up to 40 and beyond them evenly spaced ones in log n. */
function thinned(occurred: readonly number[]): readonly number[] {
  if (occurred.length <= MOST_PLOTTED) return occurred;
  const beyond = occurred.filter((n) => n > ALL_TO);
  const last = beyond.at(-1) ?? ALL_TO;
  const kept = occurred.filter((n) => n <= ALL_TO);
  const steps = MOST_PLOTTED - kept.length;
  let next = 1;
  for (const n of beyond) {
    if (n < ALL_TO * (last / ALL_TO) ** (next / steps)) continue;
    kept.push(n);
    while (next <= steps && n >= ALL_TO * (last / ALL_TO) ** (next / steps)) next += 1;
  }
  return kept;
}

function shareTable(
  data: SimulateData,
  rows: readonly number[],
  name: string | null,
  remarks: readonly string[],
): TableData {
  const quote = (member: string, n: number) => (name === null ? "" : `${name}${member}(${n})`);
  return {
    columns: [
      { name: "n", head: "n", tex: true },
      { name: "hits", head: "hits", tex: false },
      { name: "P(K=n)", head: "P(K=n)", tex: true },
      { name: "low", head: "from", tex: false },
      { name: "high", head: "to", tex: false },
    ],
    rows: rows.map((n) => {
      const { low, high } = intervalOf(data, n);
      return [
        tableEntry(exactValue(n)),
        tableEntry(exactValue(hitsOf(data, n)), {}, quote(".hits", n)),
        tableEntry(numberValue(shareOf(data, n)), {}, quote("", n)),
        tableEntry(numberValue(exact(low)), { digits: END_DIGITS }, quote(".low", n)),
        tableEntry(numberValue(exact(high)), { digits: END_DIGITS }, quote(".high", n)),
      ];
    }),
    remarks,
  };
}

/** Ends of intervals are told to so many digits. */
const END_DIGITS = 3;

function remarksOf({ plan, confidence, n, hits }: SimulateData): string[] {
  const remarks = [
    `Bars are intervals of Clopper and Pearson that cover each probability by itself with ${shortNumber(100 * confidence)} % confidence.`,
  ];
  if (plan.cut !== null)
    remarks.push(
      `Particles that branch above ${shortNumber(plan.cut)} were dropped; that changes the mean, and each probability, by at most ${bound(plan.bias)}.`,
    );
  if (plan.cap !== null)
    remarks.push(
      `A replicate ends when K reaches ${plan.cap}, as ${hits[n.indexOf(plan.cap)] ?? 0} of ${plan.replicates} did.`,
    );
  if (isAtMost(plan.tailIndex, 2))
    remarks.push("K has infinite variance, so that its average has no interval: neither mean nor variance is given.");
  return remarks;
}

/** A bound, to two digits. */
function bound(x: number): string {
  return printNumber(exact(x), { digits: 2 }).text;
}

/** Says the finding: how many had none, how the shares fall, how far K went. */
function alternative(data: SimulateData, occurred: readonly number[]): string {
  const { plan, confidence } = data;
  const shares = occurred.slice(0, 3).map((n) => {
    const { low, high } = intervalOf(data, n);
    return `P(K = ${n}) ≈ ${share(hitsOf(data, n) / plan.replicates)} (${share(low)} to ${share(high)})`;
  });
  const last = occurred.at(-1);
  const largest = last === undefined ? "" : ` The largest K that occurred is ${last}.`;
  return `The law of K by ${plan.replicates} replicates for ${startWords(plan.starts)}, with intervals of ${shortNumber(100 * confidence)} % confidence. ${shares.join("; ")}.${largest}`;
}

function share(p: number): string {
  return printNumber(exact(p), { digits: 4 }).text;
}
