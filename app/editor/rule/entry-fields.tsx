import type { ParameterField } from "../../cells/index.ts";
import { Field } from "../../ui/index.ts";
import type { Entry } from "./use-entry.ts";

interface Props {
  readonly entry: Entry;
  readonly isNew: boolean;
}

interface Line {
  readonly field: ParameterField;
  readonly label: string;
  readonly hint: string;
}

const LINES: readonly Line[] = [
  { field: "unit", label: "Unit", hint: "" },
  { field: "symbol", label: "Symbol", hint: "TeX" },
  { field: "min", label: "Scale from", hint: "" },
  { field: "max", label: "Scale to", hint: "" },
  { field: "step", label: "Step", hint: "" },
  { field: "se", label: "Standard error", hint: "" },
  { field: "note", label: "Note", hint: "" },
];

/** The fields of an entry, each with what stands against it. */
export function EntryFields({ entry, isNew }: Props) {
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
      {LINES.map(({ field, label, hint }) => (
        <div key={field} className={`hl-entry-${field}`}>
          <Field
            label={label}
            hint={hint}
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

/** What is written here is taken as it is. */
const PLAIN = { autoComplete: "off", autoCapitalize: "off", spellCheck: false } as const;
