import type { Figure, Series } from "../../figures/index.ts";
import { profileConstants } from "../../solvers/index.ts";
import { labelledAxis } from "../figure-parts.ts";
import type { Presentation } from "../presentation.ts";
import { pointsTable } from "../table-parts.ts";
import type { CellView } from "../types.ts";
import { shortNumber, shortTex } from "../values.ts";
import type { ProfileCurve, ProfileData } from "./model.ts";

/** Curves of w(x, s), labelled by their starting values; the one from s0 is the principal, the limit (1, or q where the drift is not away) a dotted level. */
export function viewProfile(data: ProfileData, presentation: Presentation): CellView {
  const limit = profileConstants(data.trajectory).limit.value;
  const series = data.curves.map((curve, index) => ({
    ...seriesOf(curve, index, data.x, limit),
    ...(presentation.name === null ? {} : { quote: quoteAt(presentation.name, curve) }),
  }));
  const drawsLimit = data.curves.some((curve) => curve.s === limit);
  const figure: Figure = {
    alternative: alternative(data),
    x: labelledAxis("x", "linear", presentation.x),
    y: labelledAxis("w", "linear", presentation.y),
    series,
    levels: drawsLimit ? [] : [{ label: shortNumber(limit), y: limit }],
    remarks: data.left,
  };
  return {
    figure,
    table: null,
    // Made when asked for: a profile within another figure is drawn without it.
    get points() {
      return pointsTable("x", figure);
    },
  };
}

function seriesOf(curve: ProfileCurve, index: number, x: readonly number[], limit: number): Series {
  const start = shortNumber(curve.s);
  const tex = startLabel(curve.s);
  const label = curve.turning ? `s_0=${tex}` : index === 0 ? `s=${tex}` : tex;
  const bound = (sign: 1 | -1) => curve.w.map((w, i) => (w === null ? null : w + sign * (curve.error[i] ?? 0)));
  return {
    name: `w(x, ${curve.turning ? "s0" : start})`,
    label,
    labelAt: x[0] === 0 ? "start" : "end",
    mark: "line",
    role: curve.turning ? "principal" : curve.s === limit ? "reference" : "ordinary",
    x,
    y: curve.w,
    low: bound(-1),
    high: bound(1),
  };
}

/** The curve as a formula: w(#) from s = 0, w(#, 1/2), from the turning value w(#, w.s0). */
function quoteAt(name: string, { s, turning }: ProfileCurve): string {
  if (s === 0) return `${name}(#)`;
  return `${name}(#, ${turning ? `${name}.s0` : String(s)})`;
}

/** Halves, thirds and quarters as fractions: they are what one types. */
function startLabel(s: number): string {
  const denominator = [1, 2, 3, 4].find((candidate) => Math.abs(s * candidate - Math.round(s * candidate)) < 1e-12);
  return denominator === undefined || denominator === 1 ? shortTex(s) : `${Math.round(s * denominator)}/${denominator}`;
}

/** Says the finding: where the curves begin, what they tend to, and how the last one leaves the barrier. */
function alternative(data: ProfileData): string {
  const range = `for x from ${shortNumber(data.x[0] ?? 0)} to ${shortNumber(data.x.at(-1) ?? 0)}`;
  const starts = data.curves.map((curve) => shortNumber(curve.s));
  const curves =
    starts.length === 1
      ? `One curve w(x, s) ${range}, s = ${starts[0]}`
      : `${starts.length} curves w(x, s) ${range}, s = ${starts.join(", ")}`;
  const turning = data.curves.find((curve) => curve.turning);
  const limit = shortNumber(profileConstants(data.trajectory).limit.value);
  if (turning !== undefined && data.trajectory.regime === "toward")
    return `${curves}. The one from s0 = 1 stays at 1, since K is finite; beyond it E s^K is infinite. All others tend to ${limit} as x grows.`;
  const last =
    turning === undefined
      ? ""
      : ` The one from s0 = ${shortNumber(turning.s)} leaves the barrier without slope; beyond it there are none.`;
  return `${curves}. All tend to ${limit} as x grows.${last}`;
}
