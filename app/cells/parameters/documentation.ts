import type { KindDocumentation } from "../kind.ts";

export const PARAMETERS_DOCUMENTATION: KindDocumentation = {
  name: "parameters",
  label: "Parameters",
  summary: "Numbers that the paper hangs from. They stand on the rule above it; formulas may read other parameters.",
  keys: [
    { name: "value", meaning: "a number, or a formula in other parameters", required: true, fallback: null },
    { name: "min", meaning: "left end of its scale", required: false, fallback: null },
    { name: "max", meaning: "right end of its scale", required: false, fallback: null },
    { name: "step", meaning: "one tick of its scale", required: false, fallback: null },
    { name: "symbol", meaning: "TeX", required: false, fallback: "its name, Greek where it is a Greek letter" },
    { name: "unit", meaning: "unit of measurement", required: false, fallback: null },
    { name: "note", meaning: "what it is, in a few words", required: false, fallback: null },
    { name: "se", meaning: "standard error, where it was measured", required: false, fallback: "0" },
  ],
  ownKeys: true,
  values: [],
  callables: [],
  parts: [],
  shows: [],
  example: "mu: {value: 2, min: 1.45, max: 4, step: 0.05, note: drift away from the barrier}\nbeta: 1",
  offered: {
    name: "",
    line: "numbers on the rule above",
    words: "parameter rule scale drag slider constant",
    body: "‹«new»›: {value: 1, min: 0, max: 2, step: 0.05, note: what it is}",
  },
};
