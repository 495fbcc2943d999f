import type { DisplayMath, InlineMath } from "./nodes.ts";

/** `\value[attributes]{formula}` in TeX; indices are those of the TeX. */
export interface ValueInTex {
  readonly from: number;
  readonly to: number;
  readonly formula: string;
  readonly formulaAt: number;
  readonly attributes: string;
  readonly attributesAt: number;
}

/** Every `\value` of a TeX text; one whose braces do not close is given in `broken` by its index. */
export function valuesInTex(tex: string): { values: ValueInTex[]; broken: number[] } {
  const values: ValueInTex[] = [];
  const broken: number[] = [];
  for (const match of tex.matchAll(/\\value(?![A-Za-z])\s*(\[[^\]]*\])?\s*/g)) {
    const from = match.index;
    if (isEscaped(tex, from)) continue;
    const open = from + match[0].length;
    const close = closingBrace(tex, open);
    if (close < 0) {
      broken.push(from);
      continue;
    }
    const attributes = match[1] ?? "";
    values.push({
      from,
      to: close + 1,
      formula: tex.slice(open + 1, close),
      formulaAt: open + 1,
      attributes: attributes.slice(1, -1),
      attributesAt: from + match[0].indexOf("[") + 1,
    });
  }
  return { values, broken };
}

/** Labels of a display: `\label{kpp}`. */
export function labelsInTex(tex: string): { label: string; from: number; to: number }[] {
  return [...tex.matchAll(/\\label\s*\{([^{}]*)\}/g)]
    .filter((match) => !isEscaped(tex, match.index))
    .map((match) => ({ label: (match[1] ?? "").trim(), from: match.index, to: match.index + match[0].length }));
}

/**
 * TeX of a math node with its numbers put in by `print` and labels taken out: what is typeset. The number of an
 * equation is in the node's `data`.
 */
export function mathTex(
  node: DisplayMath | InlineMath,
  print: (number: NonNullable<NonNullable<InlineMath["data"]>["numbers"]>[number]["number"]) => string,
): string {
  let tex = "";
  let at = 0;
  for (const { from, to, number } of node.data?.numbers ?? []) {
    tex += `${withoutLabels(node.value.slice(at, from))}{${print(number)}}`;
    at = to;
  }
  return (tex + withoutLabels(node.value.slice(at))).trim();
}

function withoutLabels(tex: string): string {
  let rest = tex;
  for (const { from, to } of labelsInTex(tex).reverse()) rest = rest.slice(0, from) + rest.slice(to);
  return rest;
}

/** Whether the backslash at an index is itself the second of a pair `\\`. */
function isEscaped(tex: string, at: number): boolean {
  let backslashes = 0;
  while (tex.charAt(at - 1 - backslashes) === "\\") backslashes++;
  return backslashes % 2 === 1;
}

/** Index of the brace that closes the one at `open`, or -1. */
function closingBrace(tex: string, open: number): number {
  if (tex.charAt(open) !== "{") return -1;
  let depth = 0;
  for (let i = open; i < tex.length; i++) {
    if (tex.charAt(i) === "{") depth++;
    if (tex.charAt(i) === "}" && --depth === 0) return i;
  }
  return -1;
}
