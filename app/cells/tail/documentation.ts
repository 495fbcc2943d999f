import type { KindDocumentation } from "../kind.ts";
import { OF_A_PROCESS, START } from "../process/reading.ts";

export const TAIL_DOCUMENTATION: KindDocumentation = {
  name: "tail",
  label: "Tail",
  summary:
    "The law of K for large n, P(K = n) ~ C n^{−3/2} s0^{−n}, against the exact law; where the drift is toward the barrier C n^{−1−d}, at the critical one C/(n log n)².",
  keys: [
    OF_A_PROCESS,
    START,
    { name: "up_to", meaning: "the n at which the law is compared, at most 100000", required: false, fallback: "1000" },
    {
      name: "terms",
      meaning: "terms of the expansion in 1/n, 1 to 8; 1 where the drift is toward the barrier",
      required: false,
      fallback: "1",
    },
  ],
  ownKeys: false,
  values: [
    { name: "s0", meaning: "radius of convergence of E s^K" },
    { name: "slope_at_start", meaning: "∂w/∂x at the start, s = s0" },
    { name: "constant", meaning: "the C of the law" },
    { name: "ratio", meaning: "exact over asymptotic at up_to" },
    { name: "omitted", meaning: "first omitted term at up_to, relative to the law" },
    { name: "exponent", meaning: "the d of C n^{−1−d}, where the drift is toward the barrier" },
  ],
  callables: [{ member: "", args: ["n"], least: 1, meaning: "the asymptotic law at n" }],
  parts: ["figure", "table", "points"],
  shows: ["figure"],
  example: "of: larvae\nstart: 1\nup_to: 1000",
  offered: {
    name: "T",
    line: "that law for large n",
    words: "asymptotic asymptotics large n constant exponent decay",
    body: "of: «process»\nstart: ‹«start»›\nup_to: 1000\ncaption: The law of $K$ for large $n$.",
  },
};
