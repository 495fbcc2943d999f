import type { Figure, Series } from "../figures/index.ts";
import type { Formula, Scope } from "../formulas/index.ts";
import { toDouble } from "../formulas/index.ts";
import type { Cell, Yaml } from "../paper/index.ts";
import type { Body } from "./body.ts";
import { parsedFormula } from "./body.ts";
import { evaluated } from "./context.ts";
import type { KeyDocumentation, KindDocumentation } from "./kind.ts";
import { didYouMean, listOfNames } from "./names.ts";
import { defaultSymbol } from "./parameters/symbol.ts";

type YamlMap = Extract<Yaml, { yaml: "map" }>;
type AxisName = "x" | "y";

export interface AxisLook {
  readonly range: readonly [number, number] | null;
  /** null: as the kind has it. */
  readonly scale: "linear" | "log" | null;
  /** TeX; null: as the kind has it. */
  readonly label: string | null;
}

/** How a result is to look: what a body says beside its computation. None of it enters a key. */
export interface Presentation {
  readonly name: string | null;
  readonly x: AxisLook;
  readonly y: AxisLook;
  /** The body as it is now, for heads and digits of columns. */
  readonly body: YamlMap | null;
  /** TeX or words for what the figure names beside its axes: curves, bands, levels, panels. */
  readonly labels: ReadonlyMap<string, string>;
  /** TeX of a name: a parameter's own symbol, or as its letters say. */
  symbolOf(name: string): string;
  /** Whether a name is that of a parameter, which varies what it enters; any other is a variable of the cell's own. */
  isParameter(name: string): boolean;
  /** What the data of another cell look like, with that cell's own looks as they are now: for kinds that draw other cells. */
  viewOf(id: string, kind: string, data: unknown): DrawnView;
}

/** A cell as another one draws it. */
export interface DrawnView {
  readonly figure: Figure | null;
  /** What it draws among other curves. */
  readonly series: readonly Series[];
  /** The axes that these series stand on in its own figure; null where that shows something else. */
  readonly axes: Pick<Figure, "x" | "y"> | null;
}

export const NOTHING_DRAWN: DrawnView = { figure: null, series: [], axes: null };

/** Keys that every kind has, or every kind with a figure. None of them changes a result. */
export const PRESENTATION_KEYS: readonly (KeyDocumentation & { readonly figuresOnly: boolean })[] = [
  {
    name: "caption",
    meaning: "Markdown with math and :value, set beneath a figure and above a table",
    required: false,
    fallback: null,
    figuresOnly: false,
  },
  {
    name: "show",
    meaning: "which of its parts appear in the paper; `none` prints nothing",
    required: false,
    fallback: "its first part",
    figuresOnly: false,
  },
  {
    name: "axes",
    meaning: "ranges, and which axes are logarithmic: {x: 0 to 4, log: y}",
    required: false,
    fallback: "from the data",
    figuresOnly: true,
  },
  {
    name: "labels",
    meaning: "TeX at the axes' ends, and beside what a figure names: {x: n, y: p_n, exact: exact law}",
    required: false,
    fallback: "the kind's",
    figuresOnly: true,
  },
];

/** The names of those that a kind has. */
export function presentationKeys(documentation: KindDocumentation): readonly string[] {
  const hasFigure = documentation.parts.includes("figure");
  return PRESENTATION_KEYS.filter(({ figuresOnly }) => hasFigure || !figuresOnly).map(({ name }) => name);
}

/** Which parts appear. Notes problems in `show`. */
export function readShow(body: Body, documentation: KindDocumentation): readonly string[] {
  const node = body.node("show");
  if (node === null) return documentation.shows;
  const items = node.yaml === "list" ? node.items : [node];
  const words = items.flatMap((item) =>
    (body.scalar(item, "the name of a part") ?? "")
      .split(/[\s,]+/)
      .filter((word) => word !== "")
      .map((part) => ({ part, item })),
  );
  const shown: string[] = [];
  for (const { part, item } of words) {
    if (documentation.parts.includes(part)) shown.push(part);
    else if (part !== "none") {
      const choices = [...documentation.parts, "none"];
      body.problem(
        item,
        `\`${part}\` is not a part of a ${documentation.name} cell: \`show\` takes ${listOfNames(choices, "or")}.${didYouMean(part, choices)}`,
      );
    }
  }
  return shown;
}

/** Notes problems in `caption`, `axes` and `labels`; their formulas are noted in the body, and may read parameters only. */
export function checkPresentation(body: Body): void {
  const caption = body.node("caption");
  if (caption !== null) body.scalar(caption, "the words of a caption");
  checkAxes(body);
  checkLabels(body);
}

/** The presentation of a cell as its body has it now; what is not right there is left as the kind has it. */
export function presentationOf(
  cell: Pick<Cell, "name" | "body">,
  parameters: Scope,
  symbols: ReadonlyMap<string, string> = new Map(),
  viewOf: Presentation["viewOf"] = () => NOTHING_DRAWN,
): Presentation {
  const axes = entriesOf(cell.body, "axes");
  const labels = entriesOf(cell.body, "labels");
  const look = (axis: AxisName): AxisLook => ({
    range: rangeOf(axes.get(axis), parameters),
    scale: scaleOf(axes, axis),
    label: scalarText(labels.get(axis)),
  });
  const symbolOf = (name: string) => symbols.get(name) ?? defaultSymbol(name);
  const words = new Map([...labels].flatMap(([name, node]) => (node.yaml === "scalar" ? [[name, node.text]] : [])));
  const isParameter = (name: string) => symbols.has(name);
  return { name: cell.name, x: look("x"), y: look("y"), body: cell.body, labels: words, symbolOf, isParameter, viewOf };
}

/** A cell's caption, Markdown with math and values, and where it stands in the paper; null when it has none. */
export function captionOf(planned: { readonly cell: Cell }): { readonly text: string; readonly offset: number } | null {
  const node = planned.cell.body?.entries.find((entry) => entry.key === "caption")?.value;
  if (node?.yaml !== "scalar" || node.text.trim() === "") return null;
  return { text: node.text, offset: node.from + (node.quoted ? 1 : 0) };
}

function checkAxes(body: Body): void {
  const node = body.node("axes");
  if (node === null) return;
  const entries = body.mapAt(node, "a map of axes such as {x: 0 to 4, log: y}");
  if (entries === null) return;
  body.onlyKeys(entries, ["x", "y", "log", "linear"], "`axes`");
  for (const entry of entries) {
    if (entry.key === "x" || entry.key === "y") {
      const interval = body.intervalAt(entry.value, `axes.${entry.key}`);
      if (interval === null)
        body.problem(entry.value, `The range of an axis is an interval: \`${entry.key}: 0 to 4\`.`);
    } else if (entry.key === "log" || entry.key === "linear") {
      for (const item of entry.value.yaml === "list" ? entry.value.items : [entry.value]) {
        const axis = body.scalar(item, "`x` or `y`");
        if (axis !== null && axis !== "x" && axis !== "y")
          body.problem(item, `\`${axis}\` is not an axis: there are \`x\` and \`y\`.`);
      }
    }
  }
}

function checkLabels(body: Body): void {
  const node = body.node("labels");
  if (node === null) return;
  const entries = body.mapAt(node, "a map of labels such as {x: x, y: w_s(x)}");
  if (entries === null) return;
  body.onlyKeys(entries, ["x", "y", ...namedInFigure(body)], "`labels`");
  for (const entry of entries) body.scalar(entry.value, "a label in TeX");
}

/** Names that a body gives to what its figure shows. */
function namedInFigure(body: Body): readonly string[] {
  const named = ["curves", "bands", "levels", "record"].flatMap((key) => {
    const node = body.node(key);
    return node?.yaml === "map" ? node.entries.map((entry) => entry.key) : [];
  });
  const panels = body.node("panels");
  const cells = panels?.yaml === "list" ? panels.items.flatMap((item) => scalarText(item) ?? []) : [];
  return [...new Set([...named, ...cells])];
}

function entriesOf(map: YamlMap | null, key: string): ReadonlyMap<string, Yaml> {
  const node = map?.entries.find((entry) => entry.key === key)?.value;
  return new Map(node?.yaml === "map" ? node.entries.map((entry) => [entry.key, entry.value]) : []);
}

function rangeOf(node: Yaml | undefined, parameters: Scope): readonly [number, number] | null {
  if (node?.yaml !== "scalar") return null;
  const ends = node.text.split(/\s+to\s+/);
  const [from, to] = ends.map((source) => axisEnd(source, parameters));
  if (ends.length !== 2 || typeof from !== "number" || typeof to !== "number") return null;
  return from < to ? [from, to] : null;
}

/** The number that an end of an axis is written as: a formula, which may read parameters. null: it comes to none. */
export function axisEnd(source: string, parameters: Scope): number | null {
  const parsed = parsedFormula(source);
  if (!parsed.ok) return null;
  const formula: Formula = parsed.formula;
  const value = evaluated(formula, parameters);
  const x = value.type === "number" ? toDouble(value.quantity) : Number.NaN;
  return Number.isFinite(x) ? x : null;
}

function scaleOf(axes: ReadonlyMap<string, Yaml>, axis: AxisName): "linear" | "log" | null {
  const named = (key: string): boolean => {
    const node = axes.get(key);
    if (node === undefined) return false;
    const items = node.yaml === "list" ? node.items : [node];
    return items.some((item) => item.yaml === "scalar" && item.text === axis);
  };
  if (named("log")) return "log";
  return named("linear") ? "linear" : null;
}

function scalarText(node: Yaml | undefined): string | null {
  return node?.yaml === "scalar" ? node.text : null;
}
