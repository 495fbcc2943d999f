import type { Formula } from "../../formulas/index.ts";
import type { YamlEntry } from "../../paper/index.ts";
import type { Offspring } from "../../solvers/index.ts";
import type { Body } from "../body.ts";
import type { ComputeContext } from "../context.ts";
import { CellFault } from "../context.ts";
import { didYouMean, listOfNames } from "../names.ts";

/** Probabilities by number of children, so that their order in the text does not matter; `binary` is {2: 1}. */
export type OffspringModel =
  | { readonly law: "finite"; readonly probabilities: Readonly<Record<string, Formula>> }
  | { readonly law: "geometric" | "poisson"; readonly mean: Formula };

const MOST_CHILDREN = 64;
/** What probabilities may miss 1 by: rounding of decimals, not a mistake. */
const SUM_TOLERANCE = 1e-12;

const CERTAIN: Formula = { node: "number", value: 1 };
const BY_NAME: Readonly<Record<string, OffspringModel>> = {
  binary: { law: "finite", probabilities: { 2: CERTAIN } },
  ternary: { law: "finite", probabilities: { 3: CERTAIN } },
};
const BINARY: OffspringModel = { law: "finite", probabilities: { 2: CERTAIN } };

const CHOICES =
  "`binary`, `ternary`, a map of number of children to probability ({0: 0.1, 2: 0.9}), {law: geometric, mean: 2} or {law: poisson, mean: 2}";

/** Reads `offspring`, noting what is wrong with it. */
export function readOffspring(body: Body): OffspringModel {
  const node = body.node("offspring");
  if (node === null) return BINARY;
  if (node.yaml === "map") {
    const named = node.entries.some((entry) => entry.key === "law" || entry.key === "mean");
    return named ? readNamedLaw(body, node.entries) : readProbabilities(body, node.entries);
  }
  const word = node.yaml === "scalar" ? node.text : "";
  const law = BY_NAME[word];
  if (law !== undefined && Object.hasOwn(BY_NAME, word)) return law;
  body.problem(node, `\`offspring\` takes ${CHOICES}.${didYouMean(word, Object.keys(BY_NAME))}`);
  return BINARY;
}

/** The law in numbers. @throws CellFault when it is not a probability law, or has no mean. */
export function offspringOf(model: OffspringModel, context: ComputeContext): Offspring {
  if (model.law !== "finite") return { law: model.law, mean: context.number(model.mean, "offspring", { above: 0 }) };
  const counts = Object.keys(model.probabilities).map(Number);
  const probabilities = Array.from({ length: Math.max(0, ...counts) + 1 }, () => 0);
  for (const [count, formula] of Object.entries(model.probabilities)) {
    probabilities[Number(count)] = context.number(formula, "offspring", { least: 0, most: 1 });
  }
  const sum = probabilities.reduce((total, probability) => total + probability, 0);
  if (Math.abs(sum - 1) > SUM_TOLERANCE) {
    throw new CellFault(
      "offspring",
      `The probabilities of \`offspring\` sum to ${Number(sum.toPrecision(12))}; they must sum to 1.`,
    );
  }
  return { law: "finite", probabilities };
}

function readProbabilities(body: Body, entries: readonly YamlEntry[]): OffspringModel {
  const probabilities: Record<string, Formula> = {};
  for (const entry of entries) {
    const isCount = /^\d+$/.test(entry.key) && Number(entry.key) <= MOST_CHILDREN;
    if (isCount) probabilities[String(Number(entry.key))] = body.formulaAt(entry.value, "offspring");
    else {
      const place = { from: entry.keyFrom, to: entry.keyTo, line: entry.line };
      body.problem(
        place,
        `\`${entry.key}\` is not a number of children: it is a whole number from 0 to ${MOST_CHILDREN}. \`offspring\` takes ${CHOICES}.`,
      );
    }
  }
  if (entries.length === 0) body.problem(body.opening, `\`offspring\` is empty; it takes ${CHOICES}.`);
  return { law: "finite", probabilities };
}

function readNamedLaw(body: Body, entries: readonly YamlEntry[]): OffspringModel {
  body.onlyKeys(entries, ["law", "mean"], "`offspring`");
  const law = entries.find((entry) => entry.key === "law");
  const mean = entries.find((entry) => entry.key === "mean");
  const laws = ["geometric", "poisson"] as const;
  const chosen = laws.find((name) => law?.value.yaml === "scalar" && law.value.text === name);
  const place = law?.value ?? entries[0]?.value ?? body.opening;
  if (chosen === undefined) {
    const word = law?.value.yaml === "scalar" ? law.value.text : "";
    body.problem(
      place,
      `The \`law\` of \`offspring\` is ${listOfNames(laws, "or")}, or a map of number of children to probability.${didYouMean(word, laws)}`,
    );
  }
  if (mean === undefined) body.problem(place, "The law of `offspring` needs its `mean`: {law: geometric, mean: 2}.");
  return { law: chosen ?? "geometric", mean: mean === undefined ? CERTAIN : body.formulaAt(mean.value, "offspring") };
}
