import type { KindDocumentation } from "../kind.ts";
import { OF_A_PROCESS } from "../process/reading.ts";

export const PROFILE_DOCUMENTATION: KindDocumentation = {
  name: "profile",
  label: "Profile",
  summary: "w(x, s) = E_x[s^K; K finite] along the half-line, for one or more s up to the turning value s0.",
  keys: [
    OF_A_PROCESS,
    {
      name: "s",
      meaning: "values of s from −1 to s0; `s0` is the turning value, 1 where the drift is toward the barrier",
      required: false,
      fallback: "[0]",
    },
    {
      name: "x",
      meaning: "from where to where, `0 to 4`",
      required: false,
      fallback: "0 to where w is within 1e-3 of its limit",
    },
  ],
  ownKeys: false,
  values: [
    { name: "slope_at_barrier", meaning: "∂w/∂x at x = 0, s = 0" },
    { name: "amplitude", meaning: "lim e^{decay x} (1 − w(x, 0)); refused unless the drift is away" },
    { name: "decay", meaning: "the rate at which w(x, 0) approaches 1" },
    {
      name: "s0",
      meaning: "the turning value of s, radius of convergence of w(x, ·); 1 where the drift is toward the barrier",
    },
  ],
  callables: [{ member: "", args: ["x", "s"], least: 1, meaning: "w(x, s); s = 0 when it is left out" }],
  parts: ["figure", "points"],
  shows: ["figure"],
  example: "of: larvae\ns: [0, 1/2, 2, s0]",
  offered: {
    name: "w",
    line: "w(x, s) along the half-line",
    words: "curves wave solution barrier s0",
    body: "of: «process»\ns: ‹[0, 1/2, s0]›\ncaption: The profiles $w(x,s)$ of «process» for some $s$ up to $s_0$.",
  },
};
