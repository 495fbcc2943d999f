import type { Figure } from "../../figures/index.ts";
import { doubleProbability, log10Probability } from "../counts/law.ts";
import { labelledAxis } from "../figure-parts.ts";
import type { Presentation } from "../presentation.ts";
import { startWords } from "../process/start.ts";
import { shortNumber } from "../values.ts";
import { numberOf, ratioOf } from "./law.ts";
import type { Comparison, TailData } from "./model.ts";

/** The law and its power, both axes logarithmic: the points come to lie on a straight line. */
export function powerFigure(data: TailData, compared: readonly Comparison[], presentation: Presentation): Figure {
  const drawn = compared.filter(({ exact, n }) => exact !== null && exact.mantissa > 0 && n > 1);
  const bound = (sign: 1 | -1) =>
    drawn.map(({ exact }) => (exact === null ? null : (exact.mantissa + sign * exact.error) * 2 ** exact.exponent));
  return {
    alternative: powerAlternative(data),
    x: labelledAxis("n", "log", presentation.x),
    y: labelledAxis("P(K=n)", "log", presentation.y),
    series: [
      {
        name: "P(K=n)",
        label: "exact",
        labelAt: "start",
        mark: "points",
        role: "ordinary",
        x: drawn.map(({ n }) => n),
        y: drawn.map(({ exact }) => (exact === null ? null : doubleProbability(exact))),
        log10y: drawn.map(({ exact }) => (exact === null ? null : log10Probability(exact))),
        low: bound(-1),
        high: bound(1),
      },
      {
        name: "asymptotic law",
        label: data.law.kind === "power" ? "C n^{-1-d}" : "C/(n \\log n)^2",
        labelAt: "end",
        mark: "line",
        role: "reference",
        x: drawn.map(({ n }) => n),
        y: drawn.map(({ law }) => doubleProbability(law)),
        log10y: drawn.map(({ law }) => log10Probability(law)),
      },
    ],
    levels: [],
    remarks: data.missing === null ? [] : [data.missing],
  };
}

function powerAlternative({ law, upTo, compared, missing, starts }: TailData): string {
  const d = "refused" in law.exponent ? "" : shortNumber(law.exponent.value);
  const form =
    law.kind === "power"
      ? `the power ${shortNumber(law.constant.value)} n^(−1−d), d = ${d}`
      : `${shortNumber(law.constant.value)}/(n log n)²`;
  const last = compared.find(({ n }) => n === upTo);
  const ratio = last === undefined ? Number.NaN : numberOf(ratioOf(last, missing)).ratio;
  const found = Number.isNaN(ratio) ? "" : ` At n = ${upTo} it is ${Number(ratio.toPrecision(6))} times that.`;
  return `P(K = n) against n on logarithmic axes, n = 2 to ${upTo}, for ${startWords(starts)}: it approaches ${form}.${found}`;
}
