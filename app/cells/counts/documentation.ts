import type { KindDocumentation } from "../kind.ts";
import { OF_A_PROCESS, START } from "../process/reading.ts";

export const COUNTS_DOCUMENTATION: KindDocumentation = {
  name: "counts",
  label: "Counts",
  summary: "The law of K, the number of particles ever absorbed at the barrier.",
  keys: [
    OF_A_PROCESS,
    START,
    { name: "up_to", meaning: "largest n of the law, at most 100000", required: false, fallback: "100" },
  ],
  ownKeys: false,
  values: [
    { name: "zero", meaning: "P(K = 0)" },
    { name: "mean", meaning: "E K, given that K is finite" },
    { name: "variance", meaning: "Var K, given that K is finite; refused where it is infinite" },
    { name: "median", meaning: "smallest n with P(K ≤ n) ≥ 1/2" },
    { name: "mode", meaning: "the most probable n" },
    { name: "s0", meaning: "radius of convergence of E s^K; 1 where the drift is toward the barrier" },
    { name: "infinite", meaning: "P(K = ∞)" },
  ],
  callables: [
    { member: "", args: ["n"], least: 1, meaning: "P(K = n), also beyond up_to" },
    { member: "above", args: ["n"], least: 1, meaning: "P(K > n)" },
    { member: "quantile", args: ["p"], least: 1, meaning: "smallest n with P(K ≤ n) ≥ p" },
    {
      member: "moment",
      args: ["j"],
      least: 1,
      meaning: "factorial moment E K(K−1)…(K−j+1); refused where it is infinite",
    },
  ],
  parts: ["figure", "table", "points"],
  shows: ["figure"],
  example: "of: larvae\nstart: 1\nup_to: 200",
  offered: {
    name: "K",
    line: "the law of the number absorbed",
    words: "absorbed law distribution number many probability stems mean variance moments",
    body: "of: «process»\nstart: ‹«start»›\nup_to: 100\ncaption: The law of $K$, the number absorbed.",
  },
};
