import type { RootContent } from "mdast";
import { nearestSpelling } from "../spelling/index.ts";
import { readAttributes, takeBrackets } from "./attributes.ts";
import type { EnvironmentName } from "./nodes.ts";
import type { Reading } from "./reading.ts";
import type { RawFence, RawPiece } from "./syntax/index.ts";
import type { Target } from "./types.ts";

/** The surroundings of the language and the nouns they print. */
export const ENVIRONMENTS: Readonly<Record<EnvironmentName, Exclude<Target["noun"], "Section"> | "Proof">> = {
  definition: "Definition",
  assumption: "Assumption",
  theorem: "Theorem",
  lemma: "Lemma",
  proposition: "Proposition",
  corollary: "Corollary",
  conjecture: "Conjecture",
  remark: "Remark",
  example: "Example",
  proof: "Proof",
};

function isEnvironmentName(name: string): name is EnvironmentName {
  return Object.hasOwn(ENVIRONMENTS, name);
}

const deepestNesting = 30;

/** A node as the parser leaves it. */
export type RawNode = RootContent | RawPiece | (RawFence & { position?: RootContent["position"] });

/** Siblings grouped: nodes as they are, and surroundings with what stands in them. */
export type Grouped =
  | { readonly kind: "node"; readonly node: RootContent | RawPiece }
  | { readonly kind: "fence"; readonly fence: RawFence & { position?: RootContent["position"] } }
  | { readonly kind: "environment"; readonly opening: Opening; readonly content: readonly Grouped[] };

export interface Opening {
  readonly name: EnvironmentName;
  readonly title: string;
  /** Where the title stands in the paper's text. */
  readonly titleFrom: number;
  readonly label: string | null;
  readonly from: number;
  readonly to: number;
  /** End of the surroundings, closing line included. */
  readonly end: number;
}

/**
 * Pairs opening and closing lines among siblings, innermost first, so that equally many colons nest. Surroundings that
 * nothing closes end before the next heading. Lines that are no surroundings of the language stay lines.
 */
export function groupEnvironments(reading: Reading, nodes: readonly RawNode[]): Grouped[] {
  const closings = pairLines(nodes);
  return group(reading, nodes, closings, 0, nodes.length);
}

/** For each opening line, the index of its closing line, or of the sibling before which it ends when nothing closes it. */
function pairLines(nodes: readonly RawNode[]): Map<number, { end: number; closed: boolean }> {
  const closings = new Map<number, { end: number; closed: boolean }>();
  const open: number[] = [];
  for (const [index, node] of nodes.entries()) {
    if (node.type !== "rawFence") continue;
    if (/^:+\s*$/.test(node.value)) {
      const opening = open.pop();
      if (opening !== undefined) closings.set(opening, { end: index, closed: true });
    } else if (open.length < deepestNesting) open.push(index);
  }
  for (const [order, index] of open.entries()) {
    const limit = open[order + 1] ?? nodes.length;
    let end = index + 1;
    while (end < limit && nodes[end]?.type !== "heading") end++;
    closings.set(index, { end, closed: false });
  }
  return closings;
}

function group(
  reading: Reading,
  nodes: readonly RawNode[],
  closings: Map<number, { end: number; closed: boolean }>,
  from: number,
  to: number,
): Grouped[] {
  const grouped: Grouped[] = [];
  for (let index = from; index < to; index++) {
    const node = nodes[index];
    if (node === undefined) break;
    if (node.type !== "rawFence") {
      grouped.push({ kind: "node", node });
      continue;
    }
    const closing = closings.get(index);
    if (closing === undefined) {
      const why = /^:+\s*$/.test(node.value) ? "closes nothing" : "is nested too deeply";
      warn(reading, node, `This line ${why}, so it is set as text. Surroundings open with a line like :::theorem.`);
      grouped.push({ kind: "fence", fence: node });
      continue;
    }
    const last = nodes[closing.closed ? closing.end : closing.end - 1];
    const opening = readOpening(
      reading,
      node,
      last === undefined ? 0 : (last.position?.end.offset ?? 0),
      closing.closed,
    );
    const content = group(reading, nodes, closings, index + 1, closing.end);
    if (opening !== null) grouped.push({ kind: "environment", opening, content });
    else {
      grouped.push({ kind: "fence", fence: node }, ...content);
      const end = nodes[closing.end];
      if (closing.closed && end?.type === "rawFence") grouped.push({ kind: "fence", fence: end });
    }
    index = closing.closed ? closing.end : closing.end - 1;
  }
  return grouped;
}

/** Reads an opening line; null when its name is none of the language's. */
function readOpening(
  reading: Reading,
  fence: RawFence & { position?: RootContent["position"] },
  end: number,
  closed: boolean,
): Opening | null {
  const { value } = fence;
  const colons = /^:+/.exec(value)?.[0].length ?? 0;
  const name = /^[A-Za-z][\w-]*/.exec(value.slice(colons))?.[0] ?? "";
  const from = fence.position?.start.offset ?? 0;
  const to = from + value.trimEnd().length;
  if (!isEnvironmentName(name)) {
    const nearest = nearestSpelling(name, Object.keys(ENVIRONMENTS));
    if (nearest === null) return null;
    const message = `“${name}” names no surroundings, so this line is set as text. Did you mean “${nearest}”?`;
    const fix = { label: `Write ${nearest}`, from: from + colons, to: from + colons + name.length, insert: nearest };
    reading.report(from, to, message, { severity: "warning", fix });
    return null;
  }
  const parts = takeBrackets(value, colons + name.length);
  const attributes = readAttributes(parts.attributes);
  const rest = parts.rest.trim();
  if (!closed) {
    const message = `This ${name} is not closed: it needs a line ::: after its last line. Until then it ends before the next heading.`;
    reading.report(from, to, message);
  }
  if (rest !== "" || attributes.values.length > 0 || attributes.rest !== "") {
    const message = `After “${name}” come a title in brackets and a label in braces: :::${name}[Title]{#label}.`;
    const insert = `:::${name}[${rest}]`;
    const fix = parts.label === null && rest !== "" ? { label: `Write ${insert}`, from, to, insert } : undefined;
    reading.report(from, to, message, fix === undefined ? {} : { fix });
  }
  let label: string | null = null;
  if (attributes.label !== null) {
    const at = from + parts.attributesAt + attributes.labelAt;
    if (name === "proof")
      reading.report(at, at + attributes.label.length, "A proof has no number, so it takes no label.");
    else label = reading.checkedLabel(attributes.label, at);
  }
  return { name, title: parts.label ?? "", titleFrom: from + parts.labelAt, label, from, to, end: Math.max(end, to) };
}

function warn(reading: Reading, fence: { position?: RootContent["position"] }, message: string): void {
  const from = fence.position?.start.offset ?? 0;
  reading.report(from, fence.position?.end.offset ?? from, message, { severity: "warning" });
}
