import type { Figure } from "../../app/figures/index.ts";
import { deepLaw, figure, profiles, series } from "./sample.ts";

/** Figures that use everything a description may say: each is laid out, drawn and printed by the tests. */

const angles = Array.from({ length: 121 }, (_, i) => (i / 120) * Math.PI * 3);

/** A spiral into a fixed point, other orbits fine, fixed points named. */
export const portrait: Figure = figure({
  x: { label: "\\omega", scale: "linear", range: null },
  y: { label: "\\omega'", scale: "linear", range: null },
  series: [
    ...[0.5, 1.6].map((scale, i) =>
      series({
        name: `orbit ${i + 1}`,
        label: "",
        role: "thin",
        parametric: true,
        arrow: true,
        x: angles.map((t) => scale * Math.exp(-t / 4) * Math.cos(t)),
        y: angles.map((t) => scale * Math.exp(-t / 4) * Math.sin(t)),
      }),
    ),
    series({
      name: "trajectory",
      label: "trajectory",
      role: "principal",
      parametric: true,
      arrow: true,
      x: angles.map((t) => Math.exp(-t / 4) * Math.cos(t)),
      y: angles.map((t) => Math.exp(-t / 4) * Math.sin(t)),
    }),
    series({
      name: "fixed points",
      label: "",
      mark: "points",
      x: [0, 1],
      y: [0, 0],
      dots: [
        { at: 0, label: "1, far out", hollow: true },
        { at: 1, label: "s_0", hollow: false },
      ],
    }),
  ],
  levels: [{ label: "", y: 0, line: "fine" }],
  verticals: [{ label: "", x: 0, line: "fine" }],
});

/** Generating profiles with their phase plane in the corner, and rings on a dotted abscissa. */
export const withInset: Figure = {
  ...profiles,
  series: [
    ...profiles.series,
    series({
      name: "simulated",
      label: "",
      mark: "points",
      colourOf: "s4",
      x: [0.5],
      y: [1.82],
      low: [null],
      high: [null],
    }),
  ],
  verticals: [{ label: "x_0", x: 0.5 }],
  inset: { figure: portrait, corner: null },
};

const ns = Array.from({ length: 9 }, (_, n) => n);

/** An exact law, its tail, and a simulation whose last points had few hits or none. */
export const law: Figure = figure({
  x: { label: "n", scale: "linear", range: null },
  y: { label: "\\mathbb{P}(K=n)", scale: "log", range: [1e-8, 1] },
  series: [
    series({ name: "exact", mark: "points", role: "principal", x: ns, y: ns.map((n) => 0.8 * 0.1 ** n) }),
    series({ name: "tail", label: "tail law", x: ns.slice(1), y: ns.slice(1).map((n) => 0.9 * 0.1 ** n) }),
    series({
      name: "S",
      label: "simulated, 95 %",
      mark: "points",
      x: [1, 2, 3, 4, 5, 6],
      y: [0.081, 0.0079, 8.4e-4, 6e-5, 1e-5, 0],
      low: [0.08, 0.0075, 7e-4, 3e-5, 2.5e-7, 0],
      high: [0.082, 0.0083, 1e-3, 1.2e-4, 5.6e-5, 3.7e-5],
    }),
  ],
});

const CRITICAL = Math.SQRT2;
const drifts = Array.from({ length: 60 }, (_, i) => 0.5 + (i / 59) * 3);

/** A quantity that jumps at a critical value: each branch ends in a dot, one of them not attained. */
export const jump: Figure = figure({
  x: { label: "\\mu", scale: "linear", range: null },
  y: { label: "", scale: "linear", range: null },
  series: [
    series({
      name: "below",
      label: "",
      x: [...drifts.filter((x) => x < CRITICAL), CRITICAL],
      y: [...drifts.filter((x) => x < CRITICAL), CRITICAL].map((x) => 0.4 * x),
      dots: [{ at: drifts.filter((x) => x < CRITICAL).length, label: "limit from below", hollow: true }],
    }),
    series({
      name: "above",
      label: "s_0",
      colourOf: "below",
      x: [CRITICAL, ...drifts.filter((x) => x > CRITICAL)],
      y: [CRITICAL, ...drifts.filter((x) => x > CRITICAL)].map((x) => 1.35 + Math.sqrt(x - CRITICAL)),
      dots: [{ at: 0, label: "1.35", hollow: false }],
    }),
  ],
  verticals: [
    { label: "\\mu_c", x: CRITICAL },
    { label: "\\sqrt{2\\beta}+0.1", x: CRITICAL + 0.1 },
  ],
  levels: [{ label: "1", y: 1 }],
  remarks: ["The curve jumps at μ = √2."],
});

/** Bands: one round its curve, one alone, and a curve with a gap. */
export const bands: Figure = figure({
  series: [
    series({
      name: "fit",
      label: "fitted",
      x: drifts,
      y: drifts.map((x) => Math.exp(-x)),
      low: drifts.map((x) => Math.exp(-x) * 0.8),
      high: drifts.map((x) => Math.exp(-x) * 1.2),
    }),
    series({
      name: "range",
      label: "between runs",
      mark: "band",
      x: drifts,
      y: drifts.map(() => null),
      low: drifts.map((x) => 0.2 + 0.05 * x),
      high: drifts.map((x) => 0.3 + 0.1 * x),
    }),
    series({
      name: "broken",
      label: "with a gap",
      x: drifts,
      y: drifts.map((x) => (x > 1.5 && x < 2 ? null : 0.7 + 0.02 * x)),
    }),
  ],
});

/** Both axes logarithmic, far below the double's range. */
export const deep: Figure = figure({
  x: { label: "n", scale: "log", range: null },
  y: { label: "p", scale: "log", range: null },
  series: [
    series({
      name: "p",
      x: [1, 10, 100, 1000],
      y: [0.1, 1e-10, 1e-100, 0],
      log10y: [-1, -10, -100, -1000],
    }),
  ],
});

/** Panels: each with axes of its own, lettered. */
export const panels: Figure = figure({
  series: [],
  panels: [
    { title: "Law of the count", figure: law },
    { title: "s_0(\\mu)", figure: jump },
    { title: "", figure: bands },
  ],
});

export const GALLERY: Readonly<Record<string, Figure>> = {
  profiles,
  portrait,
  withInset,
  law,
  jump,
  bands,
  deep,
  panels,
  deepLaw,
};
