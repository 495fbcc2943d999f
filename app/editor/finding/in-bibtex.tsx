import { Text } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import { useMemo, useRef } from "react";
import { Command } from "../../ui/index.ts";
import type { SheetAtHand } from "../keys/types.ts";
import { counted } from "../parts/words.ts";
import { findMatches, type Match, type Sought } from "../text/sought.ts";

/** How often it is looked whether the BibTeX is on the page, in frames. */
const PATIENCE = 30;

/** How often something stands in the BibTeX, which is a text of its own, and the way to it; nothing where it does not. */
export function InBibtex({ sheet, sought }: { readonly sheet: SheetAtHand; readonly sought: Sought }) {
  const bibtex = sheet.desk.bibliographyNow();
  const matches = useMemo(() => findMatches(Text.of(bibtex.split("\n")), sought).matches, [bibtex, sought]);
  const next = useRef(0);
  if (matches.length === 0) return null;
  const go = () => {
    const match = matches[next.current % matches.length];
    next.current += 1;
    if (match !== undefined) showInBibtex(match);
  };
  return (
    <Command onClick={go} className="hl-small">
      {counted(matches.length, "place")} in the BibTeX
    </Command>
  );
}

/** Shows the BibTeX if it is put away, and chooses a stretch of it. */
function showInBibtex(match: Match, patience = PATIENCE): void {
  const source = document.querySelector<HTMLElement>(".hl-bibtex .cm-editor");
  const view = source === null ? null : EditorView.findFromDOM(source);
  if (view === null) {
    if (patience === PATIENCE)
      document.querySelector<HTMLElement>("#bibliography button[aria-expanded=false]")?.click();
    if (patience > 0) requestAnimationFrame(() => showInBibtex(match, patience - 1));
    return;
  }
  const [anchor, head] = [match.from, match.to].map((at) => Math.min(at, view.state.doc.length));
  view.dispatch({
    selection: { anchor: anchor ?? 0, head: head ?? 0 },
    effects: EditorView.scrollIntoView(anchor ?? 0, { y: "center" }),
  });
  view.focus();
}
