import { type FormEvent, type ReactNode, useRef, useState } from "react";
import { removesParameter, type StillRead } from "../../cells/index.ts";
import { Command } from "../../ui/index.ts";
import type { SheetAtHand } from "../keys/types.ts";
import { useDeskView } from "../parts/use-desk-view.ts";
import { made, moveOnRule, paperNow, plainWords } from "./edit-rule.ts";
import { EntryFields } from "./entry-fields.tsx";
import { focusHandle } from "./handles.ts";
import { Readers } from "./readers.tsx";
import { useEntry } from "./use-entry.ts";

interface Props {
  readonly sheet: SheetAtHand;
  /** The parameter that is changed; null: a new one is added. */
  readonly name: string | null;
}

/** What is said of a parameter, to be written anew: Enter sets it as one edit, Esc puts back. */
export function ParameterEntry({ sheet, name }: Props) {
  const { desk } = sheet;
  const entry = useEntry(sheet, name);
  const macros = useDeskView(desk, ({ model }) => model?.macros ?? NO_MACROS);
  const form = useRef<HTMLFormElement>(null);
  const [stillRead, setStillRead] = useState<StillRead | null>(null);
  const [refused, setRefused] = useState("");
  const close = () => sheet.strips.set({ open: null });
  if (entry === null) return <p className="hl-strip-words">{name} is not a parameter of this paper any more.</p>;

  const settle = (event: FormEvent) => {
    event.preventDefault();
    const done = entry.settle();
    if (done === null) {
      // The field at fault is known with the next drawing.
      requestAnimationFrame(() => form.current?.querySelector<HTMLElement>("[aria-invalid]")?.focus());
      return;
    }
    close();
    focusHandle(entry.name);
    if (done !== "") desk.tell(done);
  };
  const remove = () => {
    if (name === null) return;
    const { paper, bibliography } = paperNow(sheet);
    const edit = removesParameter(paper, bibliography, name);
    setStillRead("readers" in edit ? edit : null);
    setRefused("problem" in edit ? plainWords(edit.problem) : "");
    if ("readers" in edit || !made(sheet, edit)) return;
    close();
    desk.tell(`${name} is removed; one step to undo.`);
  };
  return (
    <form ref={form} className="hl-entry-form" onSubmit={settle} noValidate>
      <EntryFields entry={entry} macros={macros} isNew={name === null} />
      {entry.problem?.field === null ? <Amiss>{entry.problem.problem}</Amiss> : null}
      {name === null ? null : <Hanging sheet={sheet} name={name} />}
      {stillRead === null || name === null ? null : <Readers sheet={sheet} name={name} stillRead={stillRead} />}
      {refused === "" ? null : <Amiss>{refused}</Amiss>}
      <div className="hl-entry-commands">
        <Command type="submit">{name === null ? "Add" : "Set"}</Command>
        {name === null ? null : (
          <>
            <Command onClick={() => sheet.strips.set({ open: "rename", about: name })}>Rename</Command>
            <Command onClick={() => moveOnRule(sheet, name, -1)}>Earlier</Command>
            <Command onClick={() => moveOnRule(sheet, name, 1)}>Later</Command>
            <Command onClick={remove}>Remove</Command>
          </>
        )}
      </div>
    </form>
  );
}

const NO_MACROS: Readonly<Record<string, string>> = {};

function Amiss({ children }: { readonly children: ReactNode }) {
  return (
    <p className="hl-entry-words hl-amiss" role="alert">
      ‡ {children}
    </p>
  );
}

/** What hangs from the parameter, as its value tells it to those who listen. */
function Hanging({ sheet: { desk }, name }: { readonly sheet: SheetAtHand; readonly name: string }) {
  const words = useDeskView(desk, ({ model }) => model?.parameters.find((each) => each.name === name)?.hangs ?? "");
  return words === "" ? null : <p className="hl-entry-words">{words}.</p>;
}
