import type { KindDocumentation } from "../kind.ts";

export const SWEEP_DOCUMENTATION: KindDocumentation = {
  name: "sweep",
  label: "Sweep",
  summary: "Formulas recorded along a parameter, which is varied with everything that reads it, or along a new name.",
  keys: [
    {
      name: "over",
      meaning: "one name and its values, {mu: 1.5 to 4} or {mu: [1.5, 2, 3]}",
      required: true,
      fallback: null,
    },
    {
      name: "vary",
      meaning: "a second name and a list of its values, {beta: [1, 2]}: one curve for each",
      required: false,
      fallback: null,
    },
    {
      name: "points",
      meaning: "how many points a curve has, where `over` gives an interval",
      required: false,
      fallback: "40",
    },
    {
      name: "scale",
      meaning:
        "how the points lie: `linear` evenly, `log` evenly in the logarithm, `adapted` where what is recorded bends, both ends at a jump among them",
      required: false,
      fallback: "linear",
    },
    { name: "record", meaning: "a map of names to formulas", required: true, fallback: null },
  ],
  ownKeys: false,
  values: [{ name: "points", meaning: "how many points were computed, over all curves" }],
  callables: [
    {
      member: "NAME",
      args: ["i", "j"],
      least: 1,
      meaning: "what is recorded as NAME, or the value of a varied name, at point i of curve j, both counted from 1",
    },
  ],
  parts: ["figure", "points"],
  shows: ["figure"],
  example: "over: {mu_1: 1 to 3}\npoints: 20\nrecord:\n  square: mu_1^2",
  offered: {
    name: "moves",
    line: "a result against a parameter",
    words: "moves changes against depends along vary varying parameter",
    body: "over: {‹«varied»›: «low» to «high»}\nrecord:\n  «column»: «measured»\ncaption: How `«measured»` moves with $«symbol»$.",
  },
};
