import type { KindDocumentation } from "../kind.ts";

export const PROCESS_DOCUMENTATION: KindDocumentation = {
  name: "process",
  label: "Process",
  summary: "A branching diffusion on the half-line, with generator D ∂² + drift ∂, absorbed and counted at 0.",
  keys: [
    { name: "drift", meaning: "drift, positive away from the barrier at 0", required: true, fallback: null },
    { name: "rate", meaning: "rate of branching, above 0", required: true, fallback: null },
    { name: "diffusion", meaning: "the D of D ∂², above 0", required: false, fallback: "1/2" },
    {
      name: "offspring",
      meaning:
        "law of the number of children: binary, ternary, a map of number to probability, {law: geometric, mean: 2}, {law: poisson, mean: 2}",
      required: false,
      fallback: "binary",
    },
  ],
  ownKeys: false,
  values: [
    { name: "mean_offspring", meaning: "mean number of children" },
    { name: "malthusian", meaning: "rate (mean number of children − 1), the growth rate of the mean" },
    { name: "critical_drift", meaning: "√(4 D malthusian)" },
    { name: "regime", meaning: "away (drift ≥ critical), between, or toward (drift ≤ −critical)" },
    { name: "decay", meaning: "(drift + √(drift² − 4 D malthusian))/(2 D); refused unless the drift is away" },
    { name: "far_decay", meaning: "the rate at which w(x, 0) approaches its limit" },
    { name: "limit", meaning: "lim w(x, 0) as x → ∞: 1 where the drift is away, else the extinction probability" },
    { name: "extinction_probability", meaning: "of the branching alone, without a barrier" },
  ],
  callables: [
    { member: "survival", args: ["x"], least: 1, meaning: "probability that the process begun at x never dies out" },
  ],
  parts: [],
  shows: [],
  example: "drift: 2\nrate: 1\noffspring: binary",
  offered: {
    name: "family",
    line: "drift, branching, a barrier at 0",
    words: "branching diffusion drift rate offspring particles motion",
    body: "drift: ‹«drift»›\nrate: «rate»\noffspring: binary",
  },
};
