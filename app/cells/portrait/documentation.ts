import type { KindDocumentation } from "../kind.ts";

export const PORTRAIT_DOCUMENTATION: KindDocumentation = {
  name: "portrait",
  label: "Portrait",
  summary:
    "The phase plane of D w″ + drift w′ + f(w) = 0 with the trajectory on which every w(x, s) lies; or that of a front, D u″ + speed u′ + f(u) = 0.",
  keys: [
    { name: "of", meaning: "a process; or `reaction` and `speed` in its place", required: false, fallback: null },
    {
      name: "reaction",
      meaning: "a formula in u with zeros at 0 and 1, `u*(1 - u)`, for a front from 1 to 0",
      required: false,
      fallback: null,
    },
    { name: "speed", meaning: "of the front, with `reaction`", required: false, fallback: null },
    { name: "diffusion", meaning: "the D of the front, with `reaction`", required: false, fallback: "1" },
  ],
  ownKeys: false,
  values: [
    { name: "slope_at_barrier", meaning: "∂w/∂x at x = 0, s = 0: where the trajectory leaves w = 0" },
    { name: "s0", meaning: "the turning value of s: where the trajectory meets w′ = 0 beyond 1" },
  ],
  callables: [],
  parts: ["figure", "points"],
  shows: ["figure"],
  example: "of: larvae",
  offered: {
    name: "plane",
    line: "the phase plane",
    words: "phase plane trajectory orbit orbits",
    body: "of: ‹«process»›\ncaption: All profiles of «process» lie on one trajectory of the phase plane.",
  },
};
