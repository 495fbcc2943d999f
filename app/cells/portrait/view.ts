import type { Dot, Figure, Series } from "../../figures/index.ts";
import type { FixedPoint, Orbit } from "../../solvers/index.ts";
import { labelledAxis } from "../figure-parts.ts";
import type { Presentation } from "../presentation.ts";
import { pointsTable } from "../table-parts.ts";
import type { CellView } from "../types.ts";
import { shortNumber, shortTex } from "../values.ts";
import type { PortraitData } from "./model.ts";

/** The plane (w, w′): the trajectory in ink, other orbits fine, fixed points as labelled dots, s0 and the slope at the barrier where they are. */
export function viewPortrait(data: PortraitData, presentation: Presentation): CellView {
  const { variable, window } = data;
  const x = labelledAxis(variable, "linear", presentation.x);
  const y = labelledAxis(`${variable}'`, "linear", presentation.y);
  const figure: Figure = {
    alternative: alternative(data),
    x: { ...x, range: x.range ?? window.w },
    y: { ...y, range: y.range ?? window.slope },
    series: [
      ...data.orbits.map((orbit, index) => orbitSeries(orbit, `orbit ${index + 1}`, "thin", [])),
      ...data.trajectory.map((orbit, index) =>
        orbitSeries(orbit, index === 0 ? "trajectory" : "trajectory from s0", "principal", endDots(orbit, data)),
      ),
      fixedSeries(data.fixedPoints),
    ],
    levels: [{ label: "", y: 0, line: "fine" }],
    remarks: [...data.remarks, fixedWords(data)],
  };
  return { figure, table: null, points: pointsTable(variable, figure) };
}

function orbitSeries(orbit: Orbit, name: string, role: Series["role"], dots: readonly Dot[]): Series {
  return {
    name,
    label: "",
    labelAt: "end",
    mark: "line",
    role,
    x: orbit.map(({ w }) => w),
    y: orbit.map(({ slope }) => slope),
    low: orbit.map(({ slope, error }) => slope - error),
    high: orbit.map(({ slope, error }) => slope + error),
    parametric: true,
    arrow: true,
    dots,
  };
}

/** Where a trajectory begins: at w = 0 with the slope at the barrier, or at s0. */
function endDots(orbit: Orbit, { slopeAtBarrier, s0 }: PortraitData): Dot[] {
  const first = orbit[0]?.w;
  if (first === 0 && slopeAtBarrier !== null)
    return [{ at: 0, label: `w'(0)=${shortTex(slopeAtBarrier)}`, hollow: false }];
  return first === s0 && s0 !== null ? [{ at: 0, label: `s_0=${shortTex(s0)}`, hollow: false }] : [];
}

function fixedSeries(points: readonly FixedPoint[]): Series {
  return {
    name: "fixed points",
    label: "",
    labelAt: "end",
    mark: "points",
    role: "principal",
    x: points.map(({ w }) => w),
    y: points.map(() => 0),
    parametric: true,
    dots: points.map(({ kind }, at) => ({ at, label: kind, hollow: false })),
  };
}

/** "0 is a saddle with eigenvalues 0.4142 and −2.414; 1 is a stable node with …" */
function fixedWords({ fixedPoints, variable }: PortraitData): string {
  const told = fixedPoints.map(({ w, kind, eigenvalues, imaginary }) => {
    const [a, b] = eigenvalues;
    const values =
      imaginary === 0
        ? `eigenvalues ${shortNumber(a)} and ${shortNumber(b)}`
        : `eigenvalues ${a === 0 ? "" : `${shortNumber(a)} `}± ${shortNumber(imaginary)} i`;
    return `${variable} = ${shortNumber(w)} is ${withArticle(kind)}, ${values}`;
  });
  return told.length === 0 ? "There is no fixed point here." : `${told.join("; ")}.`;
}

/** Says the finding: from where the trajectory comes, where it goes, and what the fixed points are. */
function alternative(data: PortraitData): string {
  const { variable, trajectory, orbits } = data;
  const plane = `The phase plane (${variable}, ${variable}′).`;
  const ways = trajectory.map((orbit) => {
    const [first, last] = [orbit[0], orbit.at(-1)];
    if (first === undefined || last === undefined) return "";
    return ` The trajectory goes from (${shortNumber(first.w)}, ${shortNumber(first.slope)}) to (${shortNumber(last.w)}, ${shortNumber(last.slope)}).`;
  });
  const others = orbits.length === 0 ? "" : ` ${orbits.length} other orbits are drawn fine.`;
  return `${plane}${ways.join("")} ${fixedWords(data)}${others}`;
}

/** "a saddle", "an unstable node". */
export function withArticle(kind: FixedPoint["kind"]): string {
  return /^[aeiou]/.test(kind) ? `an ${kind}` : `a ${kind}`;
}
