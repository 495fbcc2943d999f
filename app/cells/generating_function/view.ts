import type { Dot, Figure, Series, Vertical } from "../../figures/index.ts";
import { profileAt, profileConstants } from "../../solvers/index.ts";
import { labelledAxis } from "../figure-parts.ts";
import type { Presentation } from "../presentation.ts";
import { pointsTable } from "../table-parts.ts";
import type { CellView } from "../types.ts";
import { shortNumber, shortTex } from "../values.ts";
import type { GeneratingCurve, GeneratingFunctionData } from "./model.ts";

/** Curves of s ↦ E_x[s^K], labelled by their starts; verticals at s = 1 and at s0, where each ends in a dot. */
export function viewGeneratingFunction(data: GeneratingFunctionData, presentation: Presentation): CellView {
  const end = radiusOf(data);
  const figure: Figure = {
    alternative: alternative(data),
    x: labelledAxis("s", "linear", presentation.x),
    y: labelledAxis("E_x[s^K]", "linear", presentation.y),
    series: data.curves.map((curve, index) => ({
      ...seriesOf(curve, index, data.s, end),
      ...(presentation.name === null ? {} : { quote: `${presentation.name}(#, ${curve.start})` }),
    })),
    levels: [],
    verticals: verticalsOf(data, end),
    remarks: gaps(data),
  };
  return { figure, table: null, points: pointsTable("s", figure) };
}

/** s0, where the curves reach it. */
function radiusOf({ trajectory, s }: GeneratingFunctionData): number | null {
  const { s0 } = profileConstants(trajectory);
  return "refused" in s0 || (s.at(-1) ?? 0) < s0.value ? null : s0.value;
}

function seriesOf(curve: GeneratingCurve, index: number, s: readonly number[], end: number | null): Series {
  const start = shortNumber(curve.start);
  const bound = (sign: 1 | -1) => curve.g.map((g, i) => (g === null ? null : g + sign * (curve.error[i] ?? 0)));
  // where the radius is 1 every curve ends in (1, 1): no end of its own to mark
  const dots: readonly Dot[] = end === null || end === 1 ? [] : [{ at: s.length - 1, label: "", hollow: false }];
  return {
    name: `E[s^K], x = ${start}`,
    label: index === 0 ? `x=${shortTex(curve.start)}` : shortTex(curve.start),
    labelAt: "end",
    mark: "line",
    role: "ordinary",
    x: s,
    y: curve.g,
    low: bound(-1),
    high: bound(1),
    dots,
  };
}

function verticalsOf({ s }: GeneratingFunctionData, end: number | null): Vertical[] {
  const [from, to] = [s[0] ?? 0, s.at(-1) ?? 0];
  const one = from < 1 && 1 < to ? [{ label: "1", x: 1 }] : [];
  return end === null || end === 1 ? one : [...one, { label: `s_0=${shortTex(end)}`, x: end }];
}

function gaps({ curves, s, trajectory }: GeneratingFunctionData): string[] {
  const reasons = curves.flatMap(({ start, g }) => {
    const at = g.indexOf(null);
    const answer = at < 0 ? null : profileAt(trajectory, start, s[at] ?? 0);
    return answer !== null && "refused" in answer ? [answer.refused] : [];
  });
  return [...new Set(reasons)];
}

/** Says the finding: the values at 0, at 1 and at the end, and how the curves end. */
function alternative(data: GeneratingFunctionData): string {
  const { s, curves, trajectory } = data;
  const range = `s from ${shortNumber(s[0] ?? 0)} to ${shortNumber(s.at(-1) ?? 0)}`;
  const starts = curves.map(({ start }) => shortNumber(start)).join(", ");
  const told = curves.map(({ start, g }) => {
    const one = profileAt(trajectory, start, 1);
    const through = "refused" in one || !inside(s, 1) ? "" : ` through ${shortNumber(one.value)} at s = 1`;
    return `from ${words(g[0])}${through} to ${words(g.at(-1))} (x = ${shortNumber(start)})`;
  });
  const end = radiusOf(data);
  const last =
    end === null
      ? ""
      : end > 1
        ? ` At s0 = ${shortNumber(end)} ${curves.some(({ start }) => start === 0) ? "those from x > 0 end" : "each ends"} with a vertical tangent; beyond it E s^K is infinite.`
        : " Beyond s = 1 E s^K is infinite.";
  return `E_x[s^K] for x = ${starts}, ${range}: ${told.join("; ")}.${last}`;
}

function inside(s: readonly number[], at: number): boolean {
  return (s[0] ?? 0) < at && at < (s.at(-1) ?? 0);
}

function words(g: number | null | undefined): string {
  return g === null || g === undefined ? "no value" : shortNumber(g);
}
