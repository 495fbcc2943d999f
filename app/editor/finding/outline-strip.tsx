import { useMemo } from "react";
import { readPaper } from "../../paper/index.ts";
import type { SheetAtHand } from "../keys/types.ts";
import { Runs } from "../parts/runs.tsx";
import { useDeskView } from "../parts/use-desk-view.ts";
import { counted } from "../parts/words.ts";
import { type OutlineEntry, outlineOf, proseWords } from "./outline.ts";

/** Sections, theorems, figures and tables with their numbers, each leading to its place; and how many words there are. */
export function OutlineStrip({ sheet }: { readonly sheet: SheetAtHand }) {
  const { desk, view } = sheet;
  const model = useDeskView(desk, (shown) => shown.model);
  // Read anew with each answer of the worker: by then typing has rested.
  const { entries, words } = useMemo(() => {
    const paper = readPaper(model === null ? "" : view.state.doc.toString(), desk.bibliographyNow());
    return { entries: outlineOf(paper), words: proseWords(paper) };
  }, [model, view, desk]);
  const goTo = ({ from }: OutlineEntry) => {
    sheet.strips.set({ open: null });
    // After the strip has given back the keys.
    requestAnimationFrame(() => desk.goTo(from));
  };
  return (
    <>
      <p className="hl-strip-words">{counted(words, "word")} of prose, without formulas and sources.</p>
      {entries.length === 0 ? (
        <p className="hl-strip-words">Nothing has a heading yet: a line that begins with ## is one.</p>
      ) : (
        <ol className="hl-places hl-outline">
          {entries.map((entry) => (
            <li key={`${entry.from} ${entry.number}`} data-level={Math.min(entry.level, 4)}>
              <button type="button" className="hl-place" onClick={() => goTo(entry)}>
                <span className="hl-place-number">{entry.number}</span>{" "}
                <Runs runs={entry.runs} macros={model?.macros ?? NO_MACROS} />
              </button>
            </li>
          ))}
        </ol>
      )}
    </>
  );
}

const NO_MACROS = {};
