import { useEffect, useState } from "react";
import { type NoRenaming, nameAt, type Renaming, renames } from "../../cells/index.ts";
import { readPaper } from "../../paper/index.ts";
import { Command } from "../../ui/index.ts";
import type { SheetAtHand } from "../keys/types.ts";
import { counted } from "../parts/words.ts";

/** How long typing rests before the paper is read for what would change, in ms. */
const REST_MS = 250;

/** Gives a parameter, cell or label another name wherever it is used; says before in how many places. */
export function RenameStrip({ sheet }: { readonly sheet: SheetAtHand }) {
  const { desk, view } = sheet;
  const [name, setName] = useState(() => sheet.strips.get().about ?? nameAtCaret(sheet));
  const [wanted, setWanted] = useState("");
  const [seen, setSeen] = useState<Renaming | NoRenaming | null>(null);
  useEffect(() => {
    const timer = setTimeout(() => {
      const found = name === "" || wanted === "" ? null : renamingNow(sheet, name, wanted);
      setSeen(found);
      if (found !== null) desk.say(renamingWords(found));
    }, REST_MS);
    return () => clearTimeout(timer);
  }, [sheet, desk, name, wanted]);
  const rename = () => {
    // Of the text as it is now: others may have written since it was looked at.
    const renaming = renamingNow(sheet, name, wanted);
    setSeen(renaming);
    if ("problem" in renaming) return;
    desk.edit({ changes: renaming.edits, userEvent: "input.rename" });
    sheet.strips.set({ open: null });
    view.focus();
    desk.tell(`${name} is ${wanted} now, in ${counted(renaming.edits.length, "place")}; one step to undo.`);
  };
  return (
    <form
      className="hl-find"
      onSubmit={(event) => {
        event.preventDefault();
        rename();
      }}
    >
      <div className="hl-find-line">
        <NameField label="Name" value={name} onChange={setName} first={name === ""} />
        <NameField label="New name" value={wanted} onChange={setWanted} first={name !== ""} />
        <Command type="submit" disabled={seen === null || "problem" in seen}>
          Rename
        </Command>
      </div>
      <p className={seen !== null && "problem" in seen ? "hl-strip-words hl-amiss" : "hl-strip-words"}>
        {seen === null ? "The name of a parameter, a cell or a label; every use of it follows." : renamingWords(seen)}
      </p>
    </form>
  );
}

interface FieldProps {
  readonly label: string;
  readonly value: string;
  readonly first: boolean;
  onChange(value: string): void;
}

function NameField({ label, value, first, onChange }: FieldProps) {
  return (
    <label>
      {label}{" "}
      <input
        data-first={first ? "" : undefined}
        className="hl-strip-field hl-strip-name"
        value={value}
        onChange={({ target }) => onChange(target.value.trim())}
        autoComplete="off"
        autoCapitalize="off"
        spellCheck={false}
      />
    </label>
  );
}

/** "A parameter, in 14 places." */
export function renamingWords(renaming: Renaming | NoRenaming): string {
  if ("problem" in renaming) return renaming.problem;
  return `A ${renaming.what}, in ${counted(renaming.edits.length, "place")}.`;
}

function renamingNow({ desk, view }: SheetAtHand, from: string, to: string): Renaming | NoRenaming {
  const bibliography = desk.bibliographyNow();
  return renames(readPaper(view.state.doc.toString(), bibliography), bibliography, from, to);
}

function nameAtCaret({ desk, view }: SheetAtHand): string {
  const paper = readPaper(view.state.doc.toString(), desk.bibliographyNow());
  return nameAt(paper, view.state.selection.main.head) ?? "";
}
