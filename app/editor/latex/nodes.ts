import { getParser } from "@unified-latex/unified-latex-util-parse";

/** LaTeX as its parser gives it. */
export type LatexRoot = ReturnType<ReturnType<typeof getParser>["parse"]>;
export type LatexNode = LatexRoot["content"][number];
export type LatexMacro = Extract<LatexNode, { type: "macro" }>;
export type LatexEnvironment = Extract<LatexNode, { type: "environment" | "mathenv" }>;
export type LatexArgument = NonNullable<LatexMacro["args"]>[number];

/** Surroundings that a paper has, by the names under which LaTeX papers begin them. */
export const SURROUNDINGS: Readonly<Record<string, string>> = {
  theorem: "theorem",
  thm: "theorem",
  lemma: "lemma",
  lem: "lemma",
  proposition: "proposition",
  prop: "proposition",
  corollary: "corollary",
  cor: "corollary",
  definition: "definition",
  defn: "definition",
  conjecture: "conjecture",
  conj: "conjecture",
  assumption: "assumption",
  remark: "remark",
  rem: "remark",
  example: "example",
  proof: "proof",
};

/** Macros that cite. */
export const CITING = ["cite", "citep", "citet", "parencite", "textcite"];
/** Macros that refer to a label. */
export const REFERRING = ["ref", "eqref", "cref", "Cref", "autoref"];

const parser = getParser({
  macros: {
    ...Object.fromEntries(CITING.map((name) => [name, { signature: "s o o m" }])),
    ...Object.fromEntries(REFERRING.map((name) => [name, { signature: "s m" }])),
    label: { signature: "m" },
    footnote: { signature: "o m" },
    emph: { signature: "m" },
    textit: { signature: "m" },
    textbf: { signature: "m" },
    texttt: { signature: "m" },
  },
  environments: Object.fromEntries(Object.keys(SURROUNDINGS).map((name) => [name, { signature: "o" }])),
});

export function parseLatex(source: string): LatexRoot {
  return parser.parse(source);
}

/** The arguments of a macro or environment that are there, in their order; stars as such. */
export function argumentsOf(node: LatexMacro | LatexEnvironment): {
  readonly optional: readonly LatexArgument[];
  readonly required: readonly LatexArgument[];
} {
  const given = node.args ?? [];
  return {
    optional: given.filter(({ openMark }) => openMark === "["),
    required: given.filter(({ openMark }) => openMark === "{"),
  };
}

/** Words alone, without macros, mathematics or groups; null where there is anything else. */
export function plainWords(nodes: readonly LatexNode[]): string | null {
  let words = "";
  for (const node of nodes) {
    if (node.type === "string") words += node.content;
    else if (node.type === "whitespace") words += " ";
    else return null;
  }
  return words.trim();
}

export function startOf(node: LatexNode): number {
  return node.position?.start.offset ?? 0;
}

export function endOf(node: LatexNode): number {
  return node.position?.end.offset ?? 0;
}

/** Where the bracket or brace is that closes the one before a place of the source; its end where none does. */
export function closingPlace(source: string, from: number, close: string): number {
  let depth = 0;
  for (let at = from; at < source.length; at += 1) {
    const sign = source[at];
    if (sign === "\\") at += 1;
    else if (depth === 0 && sign === close) return at;
    else if (sign === "{") depth += 1;
    else if (sign === "}") depth -= 1;
  }
  return source.length;
}
