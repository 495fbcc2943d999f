import type { Value } from "../../formulas/index.ts";
import { toDouble } from "../../formulas/index.ts";
import type { Yaml } from "../../paper/index.ts";
import type { Presentation } from "../presentation.ts";
import { shortTex } from "../values.ts";

/** What a curve, band or panel is called: as `labels` says, else its name, as a symbol where it is one. */
export function labelOf(name: string, presentation: Presentation): string {
  const said = presentation.labels.get(name);
  if (said !== undefined) return said;
  const symbol = presentation.symbolOf(name);
  return /\\mathrm|^[A-Za-z]{3,}$/.test(symbol) ? name.replaceAll("_", " ") : symbol;
}

/** What a level is called: its name where it has one, else its number, or the symbol of the parameter that gives it. */
export function levelLabel(name: string, value: Value, presentation: Presentation): string {
  if (!isPlace(name)) return labelOf(name, presentation);
  const node = presentation.body?.entries.find(({ key }) => key === "levels")?.value;
  const item = node?.yaml === "list" ? node.items[Number(name)] : node;
  const written = item?.yaml === "scalar" ? item.text.trim() : "";
  if (/^[A-Za-z]\w*$/.test(written)) return presentation.symbolOf(written);
  return value.type === "number" ? shortTex(toDouble(value.quantity)) : "";
}

/** Levels of a list are named by their place in it. */
export const isPlace = (name: string): boolean => /^\d+$/.test(name);

/** The author's names under a key, in the order of the body as it is now; those that the data know and it does not come last. */
export function namesInOrder(key: string, known: readonly string[], { body }: Presentation): readonly string[] {
  const node = body?.entries.find((entry) => entry.key === key)?.value;
  const written = node?.yaml === "map" ? node.entries.map((entry) => entry.key) : [];
  const inBody = written.filter((name) => known.includes(name));
  return [...inBody, ...known.filter((name) => !inBody.includes(name))];
}

/** The cell that an entry of the body names now, whose looks its drawing takes. */
export function cellNamed(node: Yaml | undefined): string {
  return node?.yaml === "scalar" ? node.text.trim() : "";
}

/** A node under a key, or within the map that stands there. */
export function bodyNode({ body }: Presentation, key: string, inner?: string): Yaml | undefined {
  const node = body?.entries.find((entry) => entry.key === key)?.value;
  if (inner === undefined) return node;
  return node?.yaml === "map" ? node.entries.find((entry) => entry.key === inner)?.value : undefined;
}
