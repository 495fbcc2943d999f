import type { KindDocumentation } from "../kind.ts";

export const TABLE_DOCUMENTATION: KindDocumentation = {
  name: "table",
  label: "Table",
  summary: "Formulas in rows: for a new name, or for a parameter, which is then varied with everything that reads it.",
  keys: [
    {
      name: "rows",
      meaning:
        "a name and its values, {n: 1 to 4} in steps of 1 or {mu: [1.6, 2, 3]}; or several lists of equal length",
      required: true,
      fallback: null,
    },
    {
      name: "columns",
      meaning: "a map of names to formulas, or to {formula, head, digits, as}",
      required: true,
      fallback: null,
    },
  ],
  ownKeys: false,
  values: [],
  callables: [{ member: "NAME", args: ["i"], least: 1, meaning: "the entry of column NAME in row i, counted from 1" }],
  parts: ["table"],
  shows: ["table"],
  example:
    "rows: {n: 1 to 4}\ncolumns:\n  exact: K(n)\n  share: {formula: K(n)/(1 - K(0)), head: share, digits: 3, as: percent}",
  offered: {
    name: "rows",
    line: "formulas in rows",
    words: "rows columns values list",
    body: "rows: {«dummy»: «from» to «few»}\ncolumns:\n  «column»: ‹«curve»›\ncaption: The values of `«curve»`.",
  },
};
