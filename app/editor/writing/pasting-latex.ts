import type { EditorView } from "@codemirror/view";
import { looksLikeLatex } from "../latex/look.ts";
import { type SheetHost, sheetHost } from "../text/host.ts";

/**
 * Pastes LaTeX: first as it came, then, as a second step to undo, with what is sure converted. So one undo gives back
 * what was pasted, and the tail line says what was converted and offers the same.
 * @returns whether it was LaTeX
 */
export function pasteLatex(view: EditorView, plain: string): boolean {
  const host = view.state.facet(sheetHost);
  if (host === null || !looksLikeLatex(plain)) return false;
  pastePlain(view, host, plain);
  void convertPasted(view, host, plain);
  return true;
}

/**
 * Pastes BibTeX as it came, and offers to move it to the bibliography.
 * @returns whether it was nothing but entries
 */
export function pasteEntries(view: EditorView, plain: string): boolean {
  const host = view.state.facet(sheetHost);
  const entries = plain.match(/^[ \t]*@[A-Za-z]+[ \t]*\{[ \t]*[^\s,{}]+[ \t]*,/gm)?.length ?? 0;
  if (host === null || entries === 0 || !/^@[\s\S]*\}$/.test(plain.trim())) return false;
  pastePlain(view, host, plain);
  const what = entries === 1 ? "An entry of a bibliography was" : `${entries} entries of a bibliography were`;
  host.tell(`${what} pasted into the text.`, {
    name: "Move to the bibliography",
    act() {
      const at = placeOf(view, plain);
      if (at === null) host.tell("It is not in the text any more as it was pasted.");
      else {
        host.edit({ changes: { from: at, to: at + plain.length } }, `${plain.trim()}\n\n`);
        host.tell(entries === 1 ? "It stands in the bibliography now." : "They stand in the bibliography now.");
      }
      view.focus();
    },
  });
  return true;
}

function pastePlain(view: EditorView, host: SheetHost, plain: string): void {
  const { from, to } = view.state.selection.main;
  host.edit({
    changes: { from, to, insert: plain },
    selection: { anchor: from + plain.length },
    userEvent: "input.paste",
    scrollIntoView: true,
  });
}

async function convertPasted(view: EditorView, host: SheetHost, plain: string): Promise<void> {
  const { conversionWords, convertLatex } = await import("../latex/index.ts");
  const at = placeOf(view, plain);
  if (at === null) return;
  const { doc } = view.state;
  const conversion = convertLatex(plain, doc.sliceString(0, at) + doc.sliceString(at + plain.length));
  if (conversion === null) return;
  const beside = {
    before: doc.sliceString(Math.max(0, at - 2), at),
    after: doc.sliceString(at + plain.length, at + plain.length + 2),
  };
  const insert = fitted(conversion.text, plain, beside);
  replace(view, host, at, plain, insert);
  host.tell(conversionWords(conversion, host.macros), {
    name: "Keep as pasted",
    act() {
      const now = placeOf(view, insert);
      if (now === null && placeOf(view, plain) !== null) host.tell("It stands as it was pasted.");
      else if (now === null) host.tell("It has been changed since; undo gives back what was pasted.");
      else replace(view, host, now, insert, plain);
      view.focus();
    },
  });
}

/** Where a text stands that was pasted: near the caret first, else where it is the only one; null: nowhere as it was. */
function placeOf(view: EditorView, text: string): number | null {
  const whole = view.state.doc.toString();
  const near = view.state.selection.main.head - text.length;
  if (near >= 0 && whole.startsWith(text, near)) return near;
  const at = whole.indexOf(text);
  return at === -1 || whole.includes(text, at + 1) ? null : at;
}

function replace(view: EditorView, host: SheetHost, at: number, before: string, insert: string): void {
  const isAtEnd = view.state.selection.main.head === at + before.length;
  host.edit({
    changes: { from: at, to: at + before.length, insert },
    ...(isAtEnd ? { selection: { anchor: at + insert.length } } : {}),
    userEvent: "input.paste",
    scrollIntoView: isAtEnd,
  });
}

/** Within a sentence it keeps the space around it; lines of their own get blank lines beside them. */
function fitted(text: string, plain: string, beside: { readonly before: string; readonly after: string }): string {
  if (!/\n\n|^(?::::|#|\$\$|- |1\. |\|)/.test(text)) {
    return `${/^[ \t]*/.exec(plain)?.[0] ?? ""}${text}${/\s*$/.exec(plain)?.[0] ?? ""}`;
  }
  return `${breaks(beside.before, /\n*$/)}${text}${breaks(beside.after, /^\n*/)}`;
}

/** Line breaks for a blank line beside what stands there; none at an end of the text. */
export function breaks(beside: string, there: RegExp): string {
  return beside === "" ? "" : "\n".repeat(2 - (there.exec(beside)?.[0].length ?? 0));
}
