import type { Cell, Yaml } from "../paper/index.ts";
import {
  addedEntry,
  changedEntries,
  type EntryAsked,
  removedEntry,
  type YamlMap,
} from "./parameters-editing/map-edits.ts";
import { endOf, scalarText } from "./parameters-editing/scalar.ts";
import type { TextEdit } from "./text-edits.ts";

/** What a cell's `axes` says of one axis, as it is written; null: nothing, so that it is as the kind has it. */
export interface AxisSaid {
  readonly range: readonly [from: string, to: string] | null;
  readonly scale: "linear" | "log" | null;
}

export interface AxesSaid {
  readonly x: AxisSaid;
  readonly y: AxisSaid;
}

/** Nothing is said: both axes are as the kind has them. */
export const NO_AXES_SAID: AxesSaid = { x: { range: null, scale: null }, y: { range: null, scale: null } };

const AXES = ["x", "y"] as const;

/** What a cell says of its axes. */
export function axesSaid(cell: Pick<Cell, "body">): AxesSaid {
  const said = mapOf(axesNode(cell.body));
  const of = (axis: (typeof AXES)[number]): AxisSaid => ({
    range: rangeSaid(said, axis),
    scale: scaleSaid(said, axis),
  });
  return { x: of("x"), y: of("y") };
}

/**
 * The edits by which a cell says something else of its axes; what it says already stays as the author wrote it, and
 * where nothing is left to be said the key goes. In rising order; none where the cell's working cannot be read.
 * @param text of the whole paper
 */
export function axesEdits(text: string, { body }: Pick<Cell, "body">, wanted: AxesSaid): readonly TextEdit[] {
  if (body === null) return [];
  const now = axesSaid({ body });
  const asked = changes(now, wanted);
  if (asked.size === 0) return [];
  const entry = body.entries.find(({ key }) => key === "axes");
  const saysNothing = AXES.every((axis) => wanted[axis].range === null && wanted[axis].scale === null);
  if (entry === undefined) return [addedEntry(text, body, `axes: ${inBraces(asked)}`)];
  if (saysNothing) return removedEntry(text, body, entry);
  if (entry.value.yaml === "map" && entry.value.entries.length > 0) return changedEntries(text, entry.value, asked);
  const { from } = entry.value;
  const gap = text.charAt(from - 1) === ":" ? " " : "";
  return [{ from, to: endOf(text, entry.value), insert: `${gap}${inBraces(asked)}` }];
}

function changes(now: AxesSaid, wanted: AxesSaid): Map<string, EntryAsked> {
  const asked = new Map<string, EntryAsked>();
  for (const axis of AXES) {
    const range = wanted[axis].range?.join(" to ") ?? "";
    if (range !== (now[axis].range?.join(" to ") ?? "")) asked.set(axis, range);
  }
  for (const scale of ["log", "linear"] as const) {
    const those = (said: AxesSaid) => AXES.filter((axis) => said[axis].scale === scale);
    const axes = those(wanted);
    if (axes.join() === those(now).join()) continue;
    asked.set(scale, axes.length === 2 ? { yaml: "[x, y]" } : (axes[0] ?? ""));
  }
  return asked;
}

function inBraces(asked: ReadonlyMap<string, EntryAsked>): string {
  const entries = [...asked].flatMap(([key, words]) => {
    if (words === "") return [];
    return [`${key}: ${typeof words === "string" ? scalarText(words, "flow") : words.yaml}`];
  });
  return `{${entries.join(", ")}}`;
}

function axesNode(body: YamlMap | null): Yaml | undefined {
  return body?.entries.find(({ key }) => key === "axes")?.value;
}

function mapOf(node: Yaml | undefined): ReadonlyMap<string, Yaml> {
  return new Map(node?.yaml === "map" ? node.entries.map(({ key, value }) => [key, value]) : []);
}

function rangeSaid(said: ReadonlyMap<string, Yaml>, axis: string): AxisSaid["range"] {
  const node = said.get(axis);
  if (node?.yaml !== "scalar") return null;
  const [, from, to] = /^\s*(.*\S)\s+to\s+(\S.*?)\s*$/s.exec(node.text) ?? [];
  return from === undefined || to === undefined ? null : [from, to];
}

function scaleSaid(said: ReadonlyMap<string, Yaml>, axis: string): AxisSaid["scale"] {
  const names = (scale: string): boolean => {
    const node = said.get(scale);
    const items = node?.yaml === "list" ? node.items : node === undefined ? [] : [node];
    return items.some((item) => item.yaml === "scalar" && item.text.trim() === axis);
  };
  if (names("log")) return "log";
  return names("linear") ? "linear" : null;
}
