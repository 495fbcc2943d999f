import type { KindDocumentation } from "../kind.ts";

export const FORMULA_DOCUMENTATION: KindDocumentation = {
  name: "formula",
  label: "Formula",
  summary: "Numbers computed from parameters and results; each key is a name, and may read the keys before it.",
  keys: [],
  ownKeys: true,
  values: [],
  callables: [],
  parts: [],
  shows: [],
  example: "excess: mu - sqrt(2*beta)\ntwice: 2*excess",
  offered: {
    name: "derived",
    line: "numbers from other numbers",
    words: "calculate quantity expression quotient ratio number",
    body: "«key»: ‹«number»/2›",
  },
};
