import type { Figure, Series } from "./types.ts";

/** Colours of a plate. `series` are in the order they are given out; ink is left to a principal curve where there is one. */
export interface Palette {
  readonly ink: string;
  readonly quiet: string;
  readonly edge: string;
  readonly paper: string;
  readonly series: Readonly<Record<Colour, string>>;
}

export type Colour = "blue" | "ochre" | "green" | "purple" | "ink" | "crimson" | "edge";

export type Theme = "page" | "print" | "light" | "dark";

/** On the page the colours are the design's custom properties, so that light, dark and forced colours follow by themselves. */
const PAGE: Palette = {
  ink: "var(--ink)",
  quiet: "var(--ink-2)",
  edge: "var(--edge)",
  paper: "var(--paper)",
  series: {
    blue: "var(--strand-1)",
    ochre: "var(--strand-2)",
    green: "var(--strand-3)",
    purple: "var(--strand-4)",
    ink: "var(--ink)",
    crimson: "var(--strand-6)",
    edge: "var(--edge)",
  },
};

const LIGHT: Palette = {
  ink: "#1a2129",
  quiet: "#47515b",
  edge: "#858d92",
  paper: "#fbfbf8",
  series: {
    blue: "#0c67b6",
    ochre: "#a85c00",
    green: "#197248",
    purple: "#8a328d",
    ink: "#1a2129",
    crimson: "#b0246b",
    edge: "#858d92",
  },
};

const DARK: Palette = {
  ink: "#e7e5dd",
  quiet: "#b7bbba",
  edge: "#6f787e",
  paper: "#14181c",
  series: {
    blue: "#6fb5f4",
    ochre: "#e4a54f",
    green: "#5cd6a9",
    purple: "#f4b9ea",
    ink: "#e7e5dd",
    crimson: "#d7658a",
    edge: "#6f787e",
  },
};

export const PALETTES: Readonly<Record<Theme, Palette>> = {
  page: PAGE,
  light: LIGHT,
  dark: DARK,
  print: { ...LIGHT, ink: "#000000", paper: "#ffffff", series: { ...LIGHT.series, ink: "#000000" } },
};

const ORDER: readonly Colour[] = ["blue", "ochre", "green", "purple", "ink", "crimson"];
const ORDER_BESIDE_PRINCIPAL: readonly Colour[] = ["blue", "ochre", "green", "purple", "crimson"];

/** The colour of each series, in the order of the figure. */
export function seriesColours(figure: Figure): readonly Colour[] {
  const order = figure.series.some((series) => series.role === "principal") ? ORDER_BESIDE_PRINCIPAL : ORDER;
  let given = 0;
  const own = new Map<string, Colour>();
  for (const series of figure.series) {
    if (series.colourOf !== undefined) continue;
    const colour = ROLE_COLOURS[series.role] ?? order[given % order.length] ?? "ink";
    if (series.role === "ordinary") given += 1;
    own.set(series.name, colour);
  }
  return figure.series.map((series) => own.get(series.colourOf ?? series.name) ?? "ink");
}

const ROLE_COLOURS: Readonly<Partial<Record<Series["role"], Colour>>> = {
  principal: "ink",
  reference: "edge",
  thin: "edge",
};

/** Beyond this many lines colour and label are not told apart quickly enough in black and white. */
const LINES_WITHOUT_DASHES = 4;

/** Dash patterns in multiples of the line's width, for print; solid comes first. */
export const DASHES: readonly (readonly number[])[] = [
  [],
  [6, 2.5],
  [1, 2.2],
  [8, 2.5, 1, 2.5],
  [3, 2],
  [10, 3, 1, 2.5, 1, 3],
];

/**
 * Which dash pattern each series has in print: all solid up to four lines that do not cross, else the patterns in turn.
 * @returns indices into DASHES
 */
export function seriesDashes(figure: Figure): readonly number[] {
  const lines = figure.series.filter(
    ({ mark, role, colourOf }) => mark === "line" && colourOf === undefined && ROLE_COLOURS[role] !== "edge",
  );
  const needed = lines.length > LINES_WITHOUT_DASHES || crossSomewhere(lines);
  const first = lines.some(({ role }) => role === "principal") ? 1 : 0;
  const ordinary = lines.filter(({ role }) => role === "ordinary");
  const patterns = new Map(ordinary.map(({ name }, i) => [name, (i + first) % DASHES.length]));
  return figure.series.map(({ mark, name, colourOf }) =>
    needed && mark === "line" ? (patterns.get(colourOf ?? name) ?? 0) : 0,
  );
}

function crossSomewhere(lines: readonly Series[]): boolean {
  const overX = lines.filter((line) => line.parametric !== true);
  return overX.some((a, i) => overX.slice(i + 1).some((b) => cross(a, b)));
}

/** Whether two curves change sides of one another at the abscissas they share. */
function cross(a: Series, b: Series): boolean {
  const other = new Map(b.x.map((x, i) => [x, b.log10y?.[i] ?? b.y[i] ?? null]));
  let side = 0;
  for (let i = 0; i < a.x.length; i += 1) {
    const x = a.x[i];
    const mine = a.log10y?.[i] ?? a.y[i] ?? null;
    const its = x === undefined ? null : (other.get(x) ?? null);
    if (mine === null || its === null || mine === its) continue;
    const now = Math.sign(mine - its);
    if (side !== 0 && now !== side) return true;
    side = now;
  }
  return false;
}
