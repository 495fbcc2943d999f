import type { PrintedPart } from "./nodes.ts";
import type { Yaml } from "./types.ts";

/**
 * What a cell of each kind prints when its `show` says nothing. The kinds of the language are the keys of this table;
 * what a kind computes is described where it is computed.
 */
export const PRINTED_PARTS: Readonly<Record<string, "figure" | "table" | "nothing">> = {
  parameters: "nothing",
  process: "nothing",
  profile: "figure",
  generating_function: "figure",
  counts: "figure",
  tail: "figure",
  yaglom: "figure",
  simulate: "figure",
  wave: "figure",
  front: "figure",
  portrait: "figure",
  sweep: "figure",
  figure: "figure",
  table: "table",
  formula: "nothing",
  solve: "nothing",
  check: "nothing",
  data: "nothing",
  fit: "figure",
  system: "nothing",
  stability: "figure",
  pattern: "figure",
};

const partNames: readonly PrintedPart["part"][] = ["figure", "table", "points"];

/** The parts of a cell that appear, in the order of its `show`; those of its kind where it has none. */
export function printedParts(kind: string, body: Extract<Yaml, { yaml: "map" }> | null): PrintedPart["part"][] {
  const show = body?.entries.find((entry) => entry.key === "show")?.value;
  if (show === undefined) {
    const part = Object.hasOwn(PRINTED_PARTS, kind) ? PRINTED_PARTS[kind] : "nothing";
    return part === "figure" || part === "table" ? [part] : [];
  }
  const items = show.yaml === "list" ? show.items : [show];
  const words = items.flatMap((item) => (item.yaml === "scalar" ? item.text.split(/[\s,]+/) : []));
  return partNames.filter((part) => words.includes(part)).sort((a, b) => words.indexOf(a) - words.indexOf(b));
}
