import { type EditorState, type Extension, StateEffect, StateField } from "@codemirror/state";
import { EditorView, showTooltip, type Tooltip } from "@codemirror/view";
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

/** Tables from other programs become tables of the paper; the notice beneath offers them as they came. */
export const pasting: Extension = [
  pastedField,
  EditorView.domEventHandlers({
    paste(event, view) {
      const data = event.clipboardData;
      if (data === null || view.state.readOnly) return false;
      const plain = data.getData("text/plain");
      if (plain === "" && [...data.files].some(({ type }) => type.startsWith("image/"))) {
        tell(view, "Images cannot be put into a paper yet: a picture made elsewhere has no place to be kept.");
        return true;
      }
      if (!takesTables(view.state)) return false;
      const grid = gridOfPage(data.getData("text/html")) ?? gridOfTabs(plain);
      if (grid === null) return false;
      putTable(view, tableText(grid), plain, `${grid.length} rows and ${grid[0]?.length} columns`);
      return true;
    },
  }),
];

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

/** Line breaks for a blank line beside what stands there; none at an end of the text. */
function breaks(beside: string, there: RegExp): string {
  return beside === "" ? "" : "\n".repeat(2 - (there.exec(beside)?.[0].length ?? 0));
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
