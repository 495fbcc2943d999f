import { labelOf, writtenArgument } from "./macros.ts";
import {
  argumentsOf,
  endOf,
  type LatexEnvironment,
  type LatexNode,
  parseLatex,
  SURROUNDINGS,
  startOf,
} from "./nodes.ts";
import { alignmentOf, cellsOf, gridText } from "./tables.ts";
import type { Gathered } from "./writer.ts";

/** What surroundings of LaTeX become, as lines of their own; they themselves where that is not sure. */
export function environmentBlock(node: LatexEnvironment, gathered: Gathered): string {
  const name = node.env.replace(/\*$/, "");
  const block =
    name in SURROUNDINGS
      ? surroundings(node, SURROUNDINGS[name] ?? name, gathered)
      : name === "itemize" || name === "enumerate"
        ? list(node, name === "enumerate", gathered)
        : name === "tabular"
          ? table(node, gathered)
          : name === "document"
            ? gathered.write(node.content, bodyEnd(node))
            : null;
  if (block !== null) return block;
  gathered.left.add(node.env);
  return gathered.source.slice(startOf(node), endOf(node));
}

function bodyEnd(node: LatexEnvironment): number {
  return endOf(node) - `\\end{${node.env}}`.length;
}

function surroundings(node: LatexEnvironment, name: string, gathered: Gathered): string | null {
  const [given] = argumentsOf(node).optional;
  const title = given === undefined ? "" : titleOf(name, writtenArgument(given, gathered));
  if (title === null) return null;
  const labels = node.content.flatMap((each) =>
    each.type === "macro" && each.content === "label" ? [labelOf(each)] : [],
  );
  const [label] = labels;
  if (labels.length > 1 || label === null) return null;
  const content = node.content.filter((each) => each.type !== "macro" || each.content !== "label");
  gathered.count("environment");
  const head = `:::${name}${title === "" ? "" : `[${title}]`}${label === undefined ? "" : `{#${label}}`}`;
  return `${head}\n${gathered.write(content, bodyEnd(node))}\n:::`;
}

/** "Proof of Theorem 2" is what a paper sets before "of Theorem 2"; what else a proof may be called is not sure. */
function titleOf(name: string, title: string): string | null {
  if (/[[\]]/.test(title.replace(/:(?:ref|cite)\[[^\]]*\]/g, ""))) return null;
  if (name !== "proof") return title;
  return /^Proof of /.test(title) ? title.slice("Proof ".length) : null;
}

function list(node: LatexEnvironment, numbered: boolean, gathered: Gathered): string | null {
  const items = node.content.filter((each) => each.type !== "parbreak" && each.type !== "whitespace");
  const written: string[] = [];
  for (const [number, item] of items.entries()) {
    const body = item.type === "macro" && item.content === "item" ? item.args?.at(-1) : undefined;
    if (item.type !== "macro" || body === undefined || argumentsOf(item).optional.length > 0) return null;
    const next = items.slice(number + 1).find((each) => each.position !== undefined);
    const text = itemText(body.content, next === undefined ? bodyEnd(node) : startOf(next), gathered);
    const mark = numbered ? `${number + 1}. ` : "- ";
    written.push(mark + text.replace(/\n(?=[^\n])/g, `\n${" ".repeat(mark.length)}`));
  }
  if (written.length === 0) return null;
  gathered.count("list");
  return written.join("\n");
}

/** A list within an item follows its words without a blank line. */
function itemText(nodes: readonly LatexNode[], end: number, gathered: Gathered): string {
  return gathered.write(nodes, end).replace(/\n\n(?=(?:- |\d+\. ))/g, "\n");
}

function table(node: LatexEnvironment, gathered: Gathered): string | null {
  const { optional, required } = argumentsOf(node);
  const [columns] = required;
  if (columns === undefined || optional.length > 0) return null;
  const { source } = gathered;
  const head = source.slice(startOf(node), bodyEnd(node));
  const spec = /^\\begin\{tabular\*?\}\s*\{((?:[^{}]|\{[^{}]*\})*)\}/.exec(head);
  const alignment = spec === null ? null : alignmentOf(spec[1] ?? "");
  const rows = spec === null ? null : cellsOf(head.slice(spec[0].length));
  if (alignment === null || rows === null || rows[0]?.length !== alignment.length) return null;
  const set = rows.map((row) =>
    row.map((cell) => {
      // Each cell is a source of its own; what it gathers is the whole's.
      const own = gathered.part(cell);
      const text = own.write(parseLatex(cell).content, cell.length);
      gathered.takeIn(own);
      return text;
    }),
  );
  gathered.count("table");
  return gridText(set, alignment);
}
