import type { KindDocumentation } from "../kind.ts";

export const YAGLOM_DOCUMENTATION: KindDocumentation = {
  name: "yaglom",
  label: "Limit law",
  summary: "The law of K given K > 0 in the limit of a start far from the barrier, for a drift away from it.",
  keys: [
    { name: "of", meaning: "a process whose regime is away", required: true, fallback: null },
    { name: "up_to", meaning: "largest n of the law, at most 100000", required: false, fallback: "100" },
  ],
  ownKeys: false,
  values: [
    { name: "one", meaning: "P(Y = 1)" },
    { name: "mean", meaning: "E Y, one over the amplitude of the profile" },
    { name: "variance", meaning: "Var Y" },
    { name: "constant", meaning: "the C of P(Y = n) ~ C n^{−3/2} s0^{−n}" },
  ],
  callables: [
    { member: "", args: ["n"], least: 1, meaning: "P(Y = n), also beyond up_to" },
    { member: "above", args: ["n"], least: 1, meaning: "P(Y > n)" },
  ],
  parts: ["figure", "table", "points"],
  shows: ["figure"],
  example: "of: larvae\nup_to: 60",
  offered: {
    name: "Y",
    line: "from far away, given that any is absorbed",
    words: "yaglom limit conditional given absorbed far start",
    body: "of: «process»\nup_to: ‹60›\ncaption: The law of $K$ given that any is absorbed, for a far start.",
  },
};
