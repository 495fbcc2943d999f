import type { Formula, Value } from "../../formulas/index.ts";
import type { YamlEntry } from "../../paper/index.ts";
import type { Body } from "../body.ts";
import type { KindOf } from "../kind.ts";
import { endOf } from "../parameters-editing/scalar.ts";
import { PARAMETERS_DOCUMENTATION } from "./documentation.ts";
import { defaultSymbol } from "./symbol.ts";

/** What enters the key: a parameter's formula and its standard error. Their order does not. */
export interface ParametersCell {
  readonly values: Readonly<Record<string, { readonly value: Formula; readonly se: Formula }>>;
}

/** One parameter as its cell declares it, with what the rule shows beside its value. */
export interface DeclaredParameter {
  readonly name: string;
  readonly value: Formula;
  readonly se: Formula;
  readonly source: string;
  /** Span of the formula in the paper: what the rule edits. */
  readonly from: number;
  readonly to: number;
  readonly line: number;
  readonly min: Formula | null;
  readonly max: Formula | null;
  readonly step: Formula | null;
  readonly symbol: string;
  readonly unit: string;
  readonly note: string;
}

const KEYS = PARAMETERS_DOCUMENTATION.keys.map((key) => key.name);
const ZERO: Formula = { node: "number", value: 0 };

export const PARAMETERS: KindOf<ParametersCell, null> = {
  documentation: PARAMETERS_DOCUMENTATION,
  solver: "parameters 1",
  knownAtPlanning: true,

  read(body: Body): ParametersCell {
    const declared = declaredParameters(body);
    return { values: Object.fromEntries(declared.map(({ name, value, se }) => [name, { value, se }])) };
  },

  members: (model) => ({ values: Object.keys(model.values), callables: [] }),

  inspect: () => true,

  compute(model, context) {
    const values = Object.keys(model.values).map((name): [string, Value] => [
      name,
      context.value({ node: "name", name, at: 0 }),
    ]);
    return { values: Object.fromEntries(values), data: null, method: "As given" };
  },

  call: () => undefined,
  view: () => ({ figure: null, table: null, points: null }),
};

/** The parameters that a `parameters` body declares; problems are noted in the body. */
export function declaredParameters(body: Body): readonly DeclaredParameter[] {
  return body.entries
    .filter((entry) => entry.key !== "caption" && entry.key !== "show")
    .flatMap((entry) => declaredParameter(body, entry) ?? []);
}

function declaredParameter(body: Body, entry: YamlEntry): DeclaredParameter | null {
  body.introduce(entry, entry.key, false);
  const details = new Map(entry.value.yaml === "map" ? entry.value.entries.map((detail) => [detail.key, detail]) : []);
  const node = entry.value.yaml === "map" ? details.get("value")?.value : entry.value;
  if (entry.value.yaml === "map") body.onlyKeys(entry.value.entries, KEYS, "a parameter");
  if (node === undefined) {
    body.problem(
      entry.value,
      `\`${entry.key}\` has no \`value\`: write {value: 1.6, min: 1, max: 4}, or the value alone.`,
    );
    return null;
  }
  const number = (key: string): Formula | null => {
    const detail = details.get(key);
    return detail === undefined ? null : body.formulaAt(detail.value, `${entry.key}.${key}`);
  };
  const words = (key: string): string => {
    const detail = details.get(key);
    return detail === undefined ? "" : (body.scalar(detail.value, `the words of \`${key}\``) ?? "");
  };
  return {
    name: entry.key,
    value: body.formulaAt(node, `${entry.key}.value`),
    se: number("se") ?? ZERO,
    source: node.yaml === "scalar" ? node.text : "",
    from: node.from,
    to: endOf(body.text, node),
    line: node.line,
    min: number("min"),
    max: number("max"),
    step: number("step"),
    symbol: words("symbol") || defaultSymbol(entry.key),
    unit: words("unit"),
    note: words("note"),
  };
}
