import type { KindDocumentation } from "../kind.ts";
import { OF_A_PROCESS } from "../process/reading.ts";

export const GENERATING_FUNCTION_DOCUMENTATION: KindDocumentation = {
  name: "generating_function",
  label: "Generating function",
  summary: "g(s) = E_x[s^K; K finite] as a function of s, for one or more starts x, up to s0 where it ends.",
  keys: [
    OF_A_PROCESS,
    {
      name: "start",
      meaning: "where the particle starts, or a list of starts, each a curve",
      required: true,
      fallback: null,
    },
    {
      name: "s",
      meaning: "from where to where, within −1 and s0; `s0` is the radius of convergence",
      required: false,
      fallback: "0 to s0, to 1 where there is no s0",
    },
  ],
  ownKeys: false,
  values: [
    { name: "s0", meaning: "radius of convergence of E s^K" },
    { name: "mean", meaning: "slope of g at s = 1 over g(1) for the first start: E K, given that K is finite" },
  ],
  callables: [
    { member: "", args: ["s", "x"], least: 1, meaning: "E_x[s^K; K finite]; from the first start when x is left out" },
  ],
  parts: ["figure", "points"],
  shows: ["figure"],
  example: "of: larvae\nstart: [1/2, 1, 2]",
  offered: {
    name: "g",
    line: "E s^K for one or more starts",
    words: "series powers radius s0",
    body: "of: «process»\nstart: ‹«start»›\ncaption: The generating function of $K$, up to $s_0$ where it ends.",
  },
};
