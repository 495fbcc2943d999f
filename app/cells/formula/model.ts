import type { Formula, Value } from "../../formulas/index.ts";
import type { Body } from "../body.ts";
import type { KindOf } from "../kind.ts";
import { presentationKeys } from "../presentation.ts";
import { FORMULA_DOCUMENTATION } from "./documentation.ts";

/** Formulas by name. Each reads only names before it in the text, so their order need not enter the key. */
export interface FormulaCell {
  readonly values: Readonly<Record<string, Formula>>;
}

export const FORMULA: KindOf<FormulaCell, null> = {
  documentation: FORMULA_DOCUMENTATION,
  solver: "formula 1",
  knownAtPlanning: false,

  read(body: Body): FormulaCell {
    const reserved = presentationKeys(FORMULA_DOCUMENTATION);
    const values: Record<string, Formula> = {};
    for (const entry of body.entries) {
      if (reserved.includes(entry.key)) continue;
      body.introduce(entry, entry.key, false);
      values[entry.key] = body.formulaAt(entry.value, entry.key, Object.keys(values));
    }
    if (Object.keys(values).length === 0)
      body.problem(body.opening, "A `formula` cell needs at least one name and its formula: `excess: mu - 1`.");
    return { values };
  },

  members: (model) => ({ values: Object.keys(model.values), callables: [] }),

  inspect: () => true,

  compute(model, context) {
    const values: Record<string, Value> = {};
    for (const [name, formula] of Object.entries(model.values)) values[name] = context.value(formula, values);
    return { values, data: null, method: "Evaluated with error bounds" };
  },

  call: () => undefined,
  view: () => ({ figure: null, table: null, points: null }),
};
