import type { EnvironmentNode } from "../../paper/index.ts";
import type { Run } from "../model/types.ts";
import { type Collecting, lineEnd, lineStart, placeOf, text, words } from "./collecting.ts";
import { runsOf } from "./runs.ts";

/** A theorem or the like: its head runs into its first paragraph, its fences vanish, a proof ends with a square. */
export function environmentPieces(node: EnvironmentNode, into: Collecting): void {
  const { from, to } = placeOf(node);
  if (from < 0) return;
  const proof = node.environment === "proof";
  const headEnd = Math.min(lineEnd(into.text, from), to);
  into.pieces.push({ piece: "lines", from, to, dress: `hl-environment hl-environment-${node.environment}` });
  const first = node.children[0];
  const begins = first === undefined || first.type !== "paragraph" ? -1 : placeOf(first).from;
  const runsIn = begins > headEnd && into.text.slice(headEnd, begins).trim() === "" && begins - headEnd < 3;
  into.pieces.push({
    piece: "set",
    from,
    to: runsIn ? begins : headEnd,
    block: false,
    content: words(headRuns(node, into), proof ? "hl-proof-head" : "hl-environment-head"),
  });
  const footStart = lineStart(into.text, to);
  if (footStart > headEnd && /^[ \t]*:{3,}[ \t]*$/.test(into.text.slice(footStart, to))) {
    const content = words([], proof ? "hl-proof-end" : "hl-environment-end");
    into.pieces.push({ piece: "set", from: footStart, to, block: true, content });
  }
  into.descend(node);
}

/** "Theorem 2.1 (Shift). " */
function headRuns(node: EnvironmentNode, into: Collecting): Run[] {
  const noun = node.environment.charAt(0).toUpperCase() + node.environment.slice(1);
  const title = runsOf(node.title, into.numbers);
  if (node.environment === "proof") {
    const named: Run[] = title.length === 0 ? [text(noun)] : [text(`${noun} `), ...title];
    return [{ run: "emphasis", runs: [...named, text(".")] }, text(" ")];
  }
  const number = node.number === null ? "" : ` ${node.number}`;
  const head: Run = { run: "strong", runs: [text(`${noun}${number}`)] };
  const bracketed = title.length === 0 ? [] : [text(" ("), ...title, text(")")];
  return [head, ...bracketed, { run: "strong", runs: [text(".")] }, text(" ")];
}
