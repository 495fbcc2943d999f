import { completionStatus } from "@codemirror/autocomplete";
import { type Extension, StateEffect, StateField } from "@codemirror/state";
import { type EditorView, keymap, showTooltip, type Tooltip, ViewPlugin, type ViewUpdate } from "@codemirror/view";
import { sheetHost } from "../text/host.ts";
import { sheetField } from "../text/sheet-field.ts";
import { openSlotAt } from "../text/working-place.ts";
import { type Meaning, meaningAt } from "./meaning.ts";
import { wordsWithMath } from "./set-words.ts";

/** How long the caret rests in a word before it is said what it means, in ms. */
const REST_MS = 450;
/** Width from which there is a right margin, and how far from the text it begins [px]. */
const WIDE_PX = 1280;
const MARGIN_PX = 52;

const setMeaning = StateEffect.define<Meaning | null>();

/** The gloss that is shown; gone with the next move of the caret and the next change. */
const meaningField = StateField.define<Tooltip | null>({
  create: () => null,
  update(before, transaction) {
    for (const effect of transaction.effects) {
      if (effect.is(setMeaning)) return effect.value === null ? null : glossOf(effect.value);
    }
    return transaction.docChanged || transaction.selection !== undefined ? null : before;
  },
  provide: (field) => showTooltip.from(field),
});

/** Says, while the caret rests, what it rests in: in the right margin where there is one, else above the line. */
export const meaningGloss: Extension = [
  meaningField,
  ViewPlugin.fromClass(
    class {
      private readonly view: EditorView;
      private timer: ReturnType<typeof setTimeout> | undefined;
      constructor(view: EditorView) {
        this.view = view;
      }
      update(update: ViewUpdate) {
        if (!update.docChanged && !update.selectionSet && !update.focusChanged) return;
        clearTimeout(this.timer);
        if (update.view.hasFocus) this.timer = setTimeout(() => this.say(), REST_MS);
      }
      destroy() {
        clearTimeout(this.timer);
      }
      private say() {
        const { state } = this.view;
        const { main } = state.selection;
        const { model } = state.field(sheetField);
        if (model === null || !main.empty || !this.view.hasFocus || completionStatus(state) !== null) return;
        const meaning = meaningAt(state.doc.toString(), main.head, model);
        if (meaning !== null) this.view.dispatch({ effects: setMeaning.of(meaning) });
      }
    },
  ),
  keymap.of([{ key: "Escape", run: leave }]),
];

function leave(view: EditorView): boolean {
  if (view.state.field(meaningField) === null) return false;
  view.dispatch({ effects: setMeaning.of(null) });
  return true;
}

function glossOf({ from, term, words, names }: Meaning): Tooltip {
  return {
    pos: from,
    above: window.innerWidth < WIDE_PX,
    create(view) {
      const dom = document.createElement("div");
      dom.className = "hl-meaning";
      dom.setAttribute("role", "note");
      const name = document.createElement("b");
      name.textContent = term;
      dom.append(name);
      if (words !== "") dom.append(" ", wordsWithMath(words, view.state.field(sheetField).model?.macros ?? {}));
      if (names !== null && view.state.facet(sheetHost)?.writes === true) dom.append(" ", renameCommand(view, names));
      return { dom, getCoords: (pos) => placeOf(view, pos) };
    },
  };
}

type Box = { readonly left: number; readonly right: number; readonly top: number; readonly bottom: number };

/** Leads on to the strip that renames: what opens strips hears of it by the name that it bears. */
function renameCommand(view: EditorView, name: string): HTMLElement {
  const command = document.createElement("button");
  command.type = "button";
  command.className = "command hl-small";
  command.dataset.rename = name;
  command.textContent = "Rename";
  command.setAttribute("aria-label", `Rename ${name}`);
  command.addEventListener("click", () => leave(view));
  return command;
}

/** Beside its line where there is a margin, beneath a working that stands there; else at its word. */
function placeOf(view: EditorView, pos: number): Box {
  const at = view.coordsAtPos(pos) ?? { left: 0, right: 0, top: 0, bottom: 0 };
  if (window.innerWidth < WIDE_PX) return at;
  if (openSlotAt(view.state, pos) !== null) return lastLineAround(view, pos) ?? at;
  const left = view.contentDOM.getBoundingClientRect().right + MARGIN_PX;
  return { left, right: left, top: at.top, bottom: at.top };
}

/** The place of the last line of the working around a place, where it is on the page. */
function lastLineAround(view: EditorView, pos: number): Box | null {
  const { node } = view.domAtPos(pos);
  const cell = (node instanceof Element ? node : node.parentElement)?.closest(".hl-open-cell");
  return cell?.querySelector(".hl-working-last")?.getBoundingClientRect() ?? null;
}
