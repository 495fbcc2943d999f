import type { ParameterField } from "../../cells/index.ts";
import { Field } from "../../ui/index.ts";
import { mathFault } from "../../ui/math.ts";
import { Runs } from "../parts/runs.tsx";
import type { Entry } from "./use-entry.ts";

interface Props {
  readonly entry: Entry;
  /** TeX macros of the front matter. */
  readonly macros: Readonly<Record<string, string>>;
  readonly isNew: boolean;
}

interface Line {
  readonly field: ParameterField;
  readonly label: string;
}

const LINES: readonly Line[] = [
  { field: "unit", label: "Unit" },
  { field: "symbol", label: "Symbol" },
  { field: "min", label: "Scale from" },
  { field: "max", label: "Scale to" },
  { field: "step", label: "Step" },
  { field: "se", label: "Standard error" },
  { field: "note", label: "Note" },
];

/** The fields of an entry, each with what stands against it. */
export function EntryFields({ entry, macros, isNew }: Props) {
  const fault = (field: ParameterField | "name") =>
    entry.problem?.field === field ? `‡ ${entry.problem.problem}` : null;
  return (
    <div className="hl-entry-fields">
      {isNew ? (
        <div className="hl-entry-name">
          <Field
            data-first=""
            label="Name"
            hint="letters, digits and _, a letter first"
            fault={fault("name")}
            value={entry.name}
            onChange={({ target }) => entry.setName(target.value.trim())}
            {...PLAIN}
          />
        </div>
      ) : null}
      <div className="hl-entry-value">
        <Field
          data-first={isNew ? undefined : ""}
          label="Value"
          hint={entry.comesTo === "" ? "a number, or a formula in other parameters" : `= ${entry.comesTo}`}
          fault={fault("value")}
          value={entry.fields.value}
          onChange={({ target }) => entry.set("value", target.value)}
          {...PLAIN}
        />
      </div>
      {LINES.map(({ field, label }) => (
        <div key={field} className={`hl-entry-${field}`}>
          <Field
            label={label}
            hint={field === "symbol" ? <SymbolHint tex={entry.fields.symbol.trim()} macros={macros} /> : undefined}
            fault={fault(field)}
            value={entry.fields[field]}
            onChange={({ target }) => entry.set(field, target.value)}
            {...PLAIN}
          />
        </div>
      ))}
    </div>
  );
}

/** How a symbol is set, as long as it can be. */
function SymbolHint({ tex, macros }: { readonly tex: string } & Pick<Props, "macros">) {
  if (tex === "" || mathFault(tex, macros) !== "") return "TeX";
  return (
    <>
      TeX, set as <Runs runs={[{ run: "math", tex }]} macros={macros} />
    </>
  );
}

/** What is written here is taken as it is. */
const PLAIN = { autoComplete: "off", autoCapitalize: "off", spellCheck: false } as const;
