import { useEffect, useState } from "react";
import { Command } from "../../ui/index.ts";
import type { SheetAtHand } from "../keys/types.ts";
import type { Starts } from "./starts.ts";

interface Props {
  readonly sheet: SheetAtHand;
  readonly author: string;
  loadStarts(): Promise<Starts>;
}

/** What stands on the sheet while the paper's body is empty: where to write, the case, and papers to begin from. */
export function EmptyPaper({ sheet, author, loadStarts }: Props) {
  const { desk, view } = sheet;
  const [starts, setStarts] = useState<Starts | null>(null);
  useEffect(() => {
    let here = true;
    loadStarts().then(
      (loaded) => here && setStarts(loaded),
      // Without them the sheet is as good to write on.
      () => undefined,
    );
    return () => {
      here = false;
    };
  }, [loadStarts]);
  const text = view.state.doc.toString();
  const offered = starts?.all.filter(({ id }) => starts.lay(id, text, author) !== null) ?? [];
  const layStart = (id: string, words: string) => {
    const now = view.state.doc.toString();
    const laid = starts?.lay(id, now, author) ?? null;
    if (laid === null) return desk.tell("There is something on the sheet by now; a start would take it away.");
    desk.edit({ changes: { from: 0, to: now.length, insert: laid.text }, selection: { anchor: 0 } }, laid.bibliography);
    desk.tell(`Begun from ${words}, and being computed; Undo takes it back.`);
    whenRead(sheet, () => desk.recomputeAll());
  };
  return (
    <div className="hl-empty-paper">
      <p>
        <Command onClick={() => writeHere(sheet)}>Write here</Command>.{" "}
        <Command onClick={() => sheet.strips.set({ open: "case" })}>Open the case</Command> to set a figure.
      </p>
      {offered.length === 0 ? null : (
        <p>
          Or begin from{" "}
          {offered.map(({ id, words }, place) => (
            <span key={id}>
              {place === 0 ? "" : place === offered.length - 1 ? " or " : ", "}
              <Command onClick={() => layStart(id, words)}>{words}</Command>
            </span>
          ))}
          .
        </p>
      )}
    </div>
  );
}

/** Does something once what stands on the sheet now is read. */
function whenRead({ desk }: SheetAtHand, act: () => void): void {
  const before = desk.store.get().model;
  const stop = desk.store.watch(() => {
    const { model } = desk.store.get();
    if (model === null || model.cells.length <= (before?.cells.length ?? 0)) return;
    stop();
    act();
  });
}

/** Puts the caret on a line of its own at the end of the text. */
function writeHere({ desk, view }: SheetAtHand): void {
  const { doc } = view.state;
  const written = doc.toString();
  const lacks = written === "" || written.endsWith("\n\n") ? "" : written.endsWith("\n") ? "\n" : "\n\n";
  const end = doc.length + lacks.length;
  if (lacks !== "") desk.edit({ changes: { from: doc.length, insert: lacks } });
  desk.goTo(end);
}
