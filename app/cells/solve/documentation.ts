import type { KindDocumentation } from "../kind.ts";

export const SOLVE_DOCUMENTATION: KindDocumentation = {
  name: "solve",
  label: "Root",
  summary: "The value of a parameter, or of a new name, at which a formula becomes 0.",
  keys: [
    {
      name: "vary",
      meaning: "a parameter, which is then varied with everything that reads it, or a new name",
      required: true,
      fallback: null,
    },
    { name: "between", meaning: "where to look, `1.5 to 4`", required: true, fallback: null },
    {
      name: "where",
      meaning: "a formula that becomes 0 between the two ends, with opposite signs there: `K.s0 - 2`",
      required: true,
      fallback: null,
    },
  ],
  ownKeys: false,
  values: [
    { name: "root", meaning: "where the formula changes sign; its error covers those of the formula's values" },
    { name: "residual", meaning: "the formula at the root" },
  ],
  callables: [],
  parts: [],
  shows: [],
  example: "vary: mu\nbetween: 1.45 to 4\nwhere: K.s0 - 3",
  offered: {
    name: "level",
    line: "where a formula becomes 0",
    words: "solve zero equation where becomes inverse",
    body: "vary: «varied»\nbetween: «low» to «high»\nwhere: «measured» - ‹«near»›",
  },
};
