import type { Corner } from "../../figures/index.ts";
import type { Formula } from "../../formulas/index.ts";
import type { Yaml, YamlEntry } from "../../paper/index.ts";
import type { Body, CellReference } from "../body.ts";
import { isName, listOfNames } from "../names.ts";
import type { VariedValues } from "../varying.ts";
import { readVarying } from "../varying.ts";

/** A curve as written: a formula in the name of `over`, or a cell whose own curves are drawn. */
export type CurveModel = Formula | CellReference;

export interface BandModel {
  readonly low: Formula;
  readonly high: Formula;
}

/** What enters the computation of a figure. Names of curves, bands and levels are the author's. */
export interface FigureCell {
  readonly over: Readonly<Record<string, VariedValues>>;
  readonly curves: Readonly<Record<string, CurveModel>>;
  readonly bands: Readonly<Record<string, BandModel>>;
  /** Levels without names are counted from 0. */
  readonly levels: Readonly<Record<string, Formula>>;
  /** null: as many as the kind of curve needs. */
  readonly points: Formula | null;
  readonly inset: CellReference | null;
  readonly panels: readonly CellReference[];
}

export const CORNERS: readonly Corner[] = ["top left", "top right", "bottom left", "bottom right"];
const MOST_CURVES = 24;
const MOST_PANELS = 12;

/** Reads a figure's body; every problem is noted there. */
export function readFigure(body: Body): FigureCell {
  const over = readVarying(body, "over", "{x: 0 to 4}");
  const locals = Object.keys(over);
  const figure: FigureCell = {
    over,
    curves: readCurves(body, locals),
    bands: readBands(body, locals),
    levels: readLevels(body),
    points: body.has("points") ? body.formula("points", "121") : null,
    inset: readInset(body),
    panels: readPanels(body),
  };
  checkTogether(body, figure);
  return figure;
}

/** Whether a curve is a cell's rather than a formula. */
export function isCell(curve: CurveModel): curve is CellReference {
  return !("node" in curve);
}

function readCurves(body: Body, locals: readonly string[]): Record<string, CurveModel> {
  const curves: Record<string, CurveModel> = {};
  for (const entry of namedEntries(body, "curves", "a map of names to formulas or cells")) {
    const path = `curves.${entry.key}`;
    const { value } = entry;
    const isCellName = value.yaml === "scalar" && body.cellNames.has(value.text.trim());
    curves[entry.key] = isCellName ? body.drawnCellAt(trimmed(value), path) : body.formulaAt(value, path, locals);
  }
  return curves;
}

function trimmed(node: Extract<Yaml, { yaml: "scalar" }>): Yaml {
  return { ...node, text: node.text.trim() };
}

function readBands(body: Body, locals: readonly string[]): Record<string, BandModel> {
  const bands: Record<string, BandModel> = {};
  for (const entry of namedEntries(body, "bands", "a map of names to both ends of a band, {fit: [low, high]}")) {
    const path = `bands.${entry.key}`;
    const [low, high, ...more] = body.listAt(entry.value, path, locals);
    if (low === undefined || high === undefined || more.length > 0)
      body.problem(entry.value, `A band has two ends: write \`${entry.key}: [low, high]\`.`);
    else bands[entry.key] = { low, high };
  }
  return bands;
}

function readLevels(body: Body): Record<string, Formula> {
  const node = body.node("levels");
  if (node === null) return {};
  if (node.yaml !== "map")
    return Object.fromEntries(body.listAt(node, "levels").map((formula, index) => [String(index), formula]));
  const entries = namedEntries(body, "levels", "a list of formulas, or a map of names to them");
  return Object.fromEntries(entries.map((entry) => [entry.key, body.formulaAt(entry.value, `levels.${entry.key}`)]));
}

/** The entries of a map of the author's names. */
function namedEntries(body: Body, key: string, what: string): readonly YamlEntry[] {
  const node = body.node(key);
  const entries = node === null ? [] : (body.mapAt(node, what) ?? []);
  if (node?.yaml === "map" && entries.length === 0) body.problem(node, `\`${key}\` is empty; it takes ${what}.`);
  if (node !== null && entries.length > MOST_CURVES)
    body.problem(node, `${entries.length} stand under \`${key}\`; a figure has at most ${MOST_CURVES}.`);
  for (const { key: name, keyFrom: from, keyTo: to, line } of entries) {
    if (isName(name)) continue;
    const message = `\`${name}\` is not a name: names are letters, digits and underscores, starting with a letter. Other words may stand under \`labels\`.`;
    body.problem({ from, to, line }, message);
  }
  return entries.filter((entry) => isName(entry.key));
}

function readInset(body: Body): CellReference | null {
  const node = body.node("inset");
  if (node === null) return null;
  if (node.yaml !== "map") return body.drawnCellAt(node, "inset");
  body.onlyKeys(node.entries, ["cell", "at"], "`inset`");
  const cell = node.entries.find((entry) => entry.key === "cell");
  const at = node.entries.find((entry) => entry.key === "at");
  if (at !== undefined && cornerOf(at.value) === null)
    body.problem(at.value, `\`at\` is ${listOfNames(CORNERS, "or")}; without it the freest corner is taken.`);
  if (cell !== undefined) return body.drawnCellAt(cell.value, "inset");
  body.problem(node, "`inset` names a cell: {cell: P, at: top right}, or its name alone.");
  return null;
}

/** The corner that a node names; null for another word. */
export function cornerOf(node: Yaml): Corner | null {
  return (node.yaml === "scalar" && CORNERS.find((corner) => corner === node.text)) || null;
}

function readPanels(body: Body): CellReference[] {
  const node = body.node("panels");
  if (node === null) return [];
  if (node.yaml === "map") {
    body.problem(node, "A map stands where a list of cells is expected: write [K, T].");
    return [];
  }
  const items = node.yaml === "list" ? node.items : [node];
  if (items.length === 0) body.problem(node, "`panels` is empty; it takes a list of cells: [K, T].");
  if (items.length > MOST_PANELS)
    body.problem(node, `${items.length} panels are listed; a figure has at most ${MOST_PANELS}.`);
  return items.map((item, index) => body.drawnCellAt(item, `panels.${index}`));
}

/** What a figure's keys ask of one another. */
function checkTogether(body: Body, { over, curves, bands, panels }: FigureCell): void {
  const drawsItself = ["curves", "bands", "levels", "inset", "over", "points"].filter((key) => body.has(key));
  const names = Object.keys(over);
  const overNode = body.node("over");
  if (body.has("panels")) {
    for (const key of drawsItself)
      body.problem(
        body.placeOf(key),
        `A figure of panels draws other cells' figures and nothing of its own; \`${key}\` belongs into one of them.`,
      );
    return;
  }
  if (!body.has("curves") && !body.has("bands"))
    body.problem(body.opening, "A figure draws `curves`, `bands` or `panels`; none of them is given.");
  if (overNode !== null && names.length > 1)
    body.problem(overNode, `\`over\` takes one name and its values; here are ${listOfNames(names)}.`);
  if (Object.values(over).some((values) => "list" in values) && body.has("points"))
    body.problem(
      body.placeOf("points"),
      "`points` goes with an interval, {x: 0 to 4}; here `over` lists the points themselves.",
    );
  const first = Object.keys(curves).find((name) => !isCell(curves[name] ?? { cell: "" })) ?? Object.keys(bands)[0];
  if (overNode === null && first !== undefined && panels.length === 0)
    body.problem(
      body.placeOf(Object.hasOwn(curves, first) ? `curves.${first}` : `bands.${first}`),
      `\`${first}\` is given by a formula; \`over\` says for which name and values it is drawn: {x: 0 to 4}.`,
    );
}
