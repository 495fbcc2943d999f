import type { Figure, Series } from "../../app/figures/index.ts";

/** A series with everything said that a test does not. */
export function series(part: Partial<Series> & Pick<Series, "name" | "x" | "y">): Series {
  return { label: part.name, labelAt: "end", mark: "line", role: "ordinary", ...part };
}

/** A figure with linear axes unless a test says otherwise. */
export function figure(part: Partial<Figure> & Pick<Figure, "series">): Figure {
  return {
    alternative: "What the figure finds.",
    x: { label: "x", scale: "linear", range: null },
    y: { label: "w", scale: "linear", range: null },
    levels: [],
    remarks: [],
    ...part,
  };
}

const grid = Array.from({ length: 161 }, (_, i) => i / 100);

/** Seven curves that start on the vertical axis at the numbers that label them. */
export const profiles: Figure = figure({
  series: [0, 0.5, 2, 3, 4, 5.437].map((s, i) =>
    series({
      name: `s${i}`,
      label: ["s=0", "1/2", "2", "3", "4", "s_0=5.437"][i],
      labelAt: "start",
      role: s > 5 ? "principal" : "ordinary",
      x: grid,
      y: grid.map((x) => 1 + (s - 1) * Math.exp(-2.6 * x)),
    }),
  ),
  levels: [{ label: "1", y: 1 }],
});

const counts = Array.from({ length: 1000 }, (_, i) => i + 1);

/** A law that falls to 10^-741: far below the double's range. */
export const deepLaw: Figure = figure({
  x: { label: "n", scale: "linear", range: null },
  y: { label: "\\mathbb{P}(K=n)", scale: "log", range: null },
  series: [
    series({
      name: "K",
      mark: "stems",
      x: counts,
      y: counts.map((n) => 10 ** (-0.741 * n)),
      log10y: counts.map((n) => -0.741 * n),
    }),
  ],
});
