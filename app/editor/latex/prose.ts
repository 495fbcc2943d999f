import { displayOf } from "./displays.ts";
import { environmentBlock } from "./environments.ts";
import { macroText } from "./macros.ts";
import { endOf, type LatexMacro, type LatexNode, startOf } from "./nodes.ts";
import { ACCENTS, accented, SIGNS } from "./words.ts";
import { type Gathered, Stretch } from "./writer.ts";

/**
 * LaTeX as text of a paper.
 * @param end where in the source the nodes end
 */
export function written(nodes: readonly LatexNode[], end: number, gathered: Gathered): string {
  const out = new Stretch();
  for (let at = 0; at < nodes.length; at += 1) {
    const node = nodes[at];
    if (node !== undefined) at += addNode(node, nodes, at, { end, gathered, out });
  }
  return out.finished();
}

interface Place {
  readonly end: number;
  readonly gathered: Gathered;
  readonly out: Stretch;
}

/** @returns how many of the nodes after it were used up with it */
function addNode(node: LatexNode, nodes: readonly LatexNode[], at: number, { end, gathered, out }: Place): number {
  const { source } = gathered;
  switch (node.type) {
    case "string":
      out.addWords(node.content);
      return 0;
    case "whitespace":
      out.addWords(source.slice(startOf(node), endOf(node)).includes("\n") ? "\n" : " ");
      return 0;
    case "parbreak":
      out.add("\n\n");
      return 0;
    case "comment":
      addComment(node.content, out);
      return 0;
    case "inlinemath": {
      const tex = source.slice(startOf(node), endOf(node)).replace(/^(?:\$|\\\()\s*|\s*(?:\$|\\\))$/g, "");
      gathered.formulas.push(tex);
      if (source.startsWith("\\(", startOf(node))) gathered.count("formula");
      out.add(`$${tex.replace(/\s*\n\s*/g, " ")}$`);
      return 0;
    }
    case "displaymath":
    case "mathenv": {
      const name = node.type === "mathenv" ? nameOf(node.env) : "";
      const whole = source.slice(startOf(node), endOf(node));
      const tex = name === "" ? whole.slice(2, -2) : whole.slice(`\\begin{${name}}`.length, -`\\end{${name}}`.length);
      const display = displayOf(name, tex);
      if (display === null) {
        gathered.left.add(name);
        out.addBlock(whole);
        return 0;
      }
      gathered.formulas.push(tex.replace(/\\label\s*\{[^{}]*\}/g, ""));
      if (!whole.startsWith("$$")) gathered.count("display");
      out.addBlock(display);
      return 0;
    }
    case "environment":
      out.addBlock(environmentBlock(node, gathered));
      return 0;
    case "group":
      out.add(groupText(node, gathered));
      return 0;
    case "macro":
      return addMacro(node, nodes, at, { end, gathered, out });
    default:
      out.add(source.slice(startOf(node), endOf(node)));
      return 0;
  }
}

/** A remark stays one, within its line: on a line of its own it would part a paragraph. */
function addComment(remark: string, out: Stretch): void {
  const words = remark.trim();
  out.add(words === "" || words.includes("--") ? "\n" : ` <!-- ${words} -->\n`);
}

function nameOf(env: unknown): string {
  if (typeof env === "string") return env;
  return typeof env === "object" && env !== null && "content" in env ? String(env.content) : "";
}

const SWITCHES: Readonly<Record<string, string>> = { em: "*", it: "*", itshape: "*", bf: "**", bfseries: "**" };

/** Braces around words go; those around a change of the letters become an emphasis. */
function groupText(node: Extract<LatexNode, { type: "group" }>, gathered: Gathered): string {
  const [first, ...rest] = node.content;
  const end = endOf(node) - 1;
  const mark = first?.type === "macro" ? SWITCHES[first.content] : undefined;
  if (mark !== undefined) {
    gathered.count("emphasis");
    return `${mark}${written(rest, end, gathered)}${mark}`;
  }
  if (first?.type === "macro" && SIGNS[first.content] === undefined && ACCENTS[first.content] === undefined) {
    gathered.left.add(`\\${first.content}`);
    return gathered.source.slice(startOf(node), endOf(node));
  }
  return written(node.content, end, gathered);
}

function addMacro(macro: LatexMacro, nodes: readonly LatexNode[], at: number, place: Place): number {
  const { end, gathered, out } = place;
  const sign = SIGNS[macro.content];
  if (sign !== undefined) {
    // A section's sign may be the noun of a reference.
    if (sign === "§") out.addWords(sign);
    else out.add(sign);
    // A macro of letters takes the space after it, or the empty braces.
    const next = nodes[at + 1];
    const isEmpty = next?.type === "group" && next.content.length === 0;
    return isEmpty || (/^[A-Za-z]+$/.test(macro.content) && next?.type === "whitespace") ? 1 : 0;
  }
  const accent = ACCENTS[macro.content];
  if (accent !== undefined) {
    const found = letterAfter(nodes, at);
    if (found !== null) {
      out.add(accented(found.letter, accent));
      return found.used;
    }
  }
  const next = nodes.slice(at + 1).find((node) => node.position !== undefined);
  const rawEnd = next === undefined ? end : startOf(next);
  const done = macroText(macro, nodes[at + 1], out, gathered);
  if (done !== null) return done;
  // With the groups after it, which may be its arguments.
  let used = 0;
  let to = macro.args === undefined ? endOf(macro) : rawEnd;
  for (let group = nodes[at + 1]; group?.type === "group" && startOf(group) === to; group = nodes[at + 1 + used]) {
    to = endOf(group);
    used += 1;
  }
  gathered.left.add(`\\${macro.content}`);
  out.add(gathered.source.slice(startOf(macro), to));
  return used;
}

/** The letter that an accent stands on, with a space between where the accent is a letter itself. */
function letterAfter(nodes: readonly LatexNode[], at: number): { letter: string; used: number } | null {
  const skipped = nodes[at + 1]?.type === "whitespace" ? 1 : 0;
  const node = nodes[at + 1 + skipped];
  const inner = node?.type === "group" && node.content.length === 1 ? node.content[0] : node;
  if (inner?.type === "string" && /^\p{L}/u.test(inner.content)) return { letter: inner.content, used: skipped + 1 };
  if (inner?.type === "macro" && inner.content === "i") return { letter: "i", used: skipped + 1 };
  return null;
}
