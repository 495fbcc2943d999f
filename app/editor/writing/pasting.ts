import { type EditorState, type Extension, StateEffect, StateField } from "@codemirror/state";
import { EditorView, showTooltip, type Tooltip } from "@codemirror/view";
import { breaks, pasteEntries, pasteLatex } from "./pasting-latex.ts";
import { cellAround, inMath } from "./place.ts";
import { gridOfPage, gridOfTabs, tableText } from "./table-text.ts";

/** What a paste has become, and what it was. */
interface Pasted {
  readonly from: number;
  readonly to: number;
  readonly words: string;
  /** Put in for from..to when it is to be left as it was; null: nothing was pasted. */
  readonly plain: string | null;
}

const setPasted = StateEffect.define<Pasted | null>();

/** Told of until the next change or move of the caret. */
const pastedField = StateField.define<Tooltip | null>({
  create: () => null,
  update(before, transaction) {
    for (const effect of transaction.effects) {
      if (effect.is(setPasted)) return effect.value === null ? null : noticeOf(effect.value);
    }
    return transaction.docChanged || transaction.selection !== undefined ? null : before;
  },
  provide: (field) => showTooltip.from(field),
});

/** Tables and LaTeX from elsewhere become the paper's; both can be had as they came. */
export const pasting: Extension = [
  pastedField,
  EditorView.domEventHandlers({
    paste(event, view) {
      const data = event.clipboardData;
      if (data === null || view.state.readOnly) return false;
      const plain = data.getData("text/plain");
      if (plain === "" && holdsImage(data)) {
        tell(view, NO_IMAGES);
        return true;
      }
      if (!takesTables(view.state)) return false;
      const grid = gridOfPage(data.getData("text/html")) ?? gridOfTabs(plain);
      if (grid === null) {
        const text = plain.replace(/\r\n?/g, "\n");
        return pasteEntries(view, text) || pasteLatex(view, text);
      }
      putTable(view, tableText(grid), plain, `${grid.length} rows and ${grid[0]?.length} columns`);
      return true;
    },
    drop(event, view) {
      if (event.dataTransfer === null || view.state.readOnly || !holdsImage(event.dataTransfer)) return false;
      tell(view, NO_IMAGES);
      event.preventDefault();
      return true;
    },
  }),
];

const NO_IMAGES =
  "Images cannot be put into a paper yet: a picture made elsewhere has no place to be kept. It is still where it came from; figures are drawn by cells, and tables can be pasted.";

function holdsImage({ files }: DataTransfer): boolean {
  return [...files].some(({ type }) => type.startsWith("image/"));
}

/** In prose; a working, mathematics and the front matter take what comes as it is. */
function takesTables(state: EditorState): boolean {
  const { from } = state.selection.main;
  const before = state.sliceDoc(0, from);
  const inFront = /^---\n(?![\s\S]*\n---\s*\n)/.test(before);
  const block = before.slice(Math.max(0, before.lastIndexOf("\n\n")));
  return !inFront && cellAround(before, from) === null && !inMath(block);
}

function putTable(view: EditorView, table: string, plain: string, size: string): void {
  const { state } = view;
  const { from, to } = state.selection.main;
  const insert = `${breaks(state.sliceDoc(Math.max(0, from - 2), from), /\n*$/)}${table}${breaks(state.sliceDoc(to, to + 2), /^\n*/)}`;
  const end = from + insert.length;
  view.dispatch({
    changes: { from, to, insert },
    selection: { anchor: end },
    userEvent: "input.paste",
    scrollIntoView: true,
    effects: setPasted.of({ from, to: end, words: `Pasted as a table of ${size}.`, plain }),
  });
}

function tell(view: EditorView, words: string): void {
  const { from, to } = view.state.selection.main;
  view.dispatch({ effects: setPasted.of({ from, to, words, plain: null }) });
}

function noticeOf({ from, to, words, plain }: Pasted): Tooltip {
  return {
    pos: to,
    create(view) {
      const dom = document.createElement("div");
      dom.className = "hl-meaning";
      dom.setAttribute("role", "status");
      dom.append(words);
      if (plain === null) return { dom };
      const command = document.createElement("button");
      command.type = "button";
      command.className = "command hl-small";
      command.textContent = "Paste it as it is";
      command.addEventListener("mousedown", (event) => event.preventDefault());
      command.addEventListener("click", () => {
        view.dispatch({
          changes: { from, to, insert: plain },
          selection: { anchor: from + plain.length },
          userEvent: "input.paste",
        });
        view.focus();
      });
      dom.append(" ", command);
      return { dom };
    },
  };
}
