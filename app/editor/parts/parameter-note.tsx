import type { ParameterFace } from "../model/types.ts";

interface Props {
  readonly parameter: ParameterFace;
  /** Opens the parameter's entry; null: for one who only reads. */
  readonly onChange: (() => void) | null;
}

/** What a parameter is, and its formula where it is one: for one who writes, the command that opens its entry. */
export function ParameterNote({ parameter, onChange }: Props) {
  const { name, note, plain, source } = parameter;
  const words = plain ? note : `${note} = ${source}`.replace(/^ = /, "");
  if (onChange === null) return <div className="hl-par-note">{words}</div>;
  const shown = words === "" ? "Describe" : words;
  return (
    <button
      type="button"
      className={words === "" ? "hl-par-note hl-par-bare" : "hl-par-note"}
      aria-label={`${shown}: change ${name}`}
      title={words === "" ? `Unit, note and scale of ${name}` : `${words}: unit, note and scale of ${name}`}
      onClick={onChange}
    >
      {shown}
    </button>
  );
}
