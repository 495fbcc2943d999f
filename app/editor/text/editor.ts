import { defaultKeymap } from "@codemirror/commands";
import { EditorState, type Extension } from "@codemirror/state";
import { drawSelection, EditorView, gutters, keymap, type ViewUpdate } from "@codemirror/view";
import { yCollab, yUndoManagerKeymap } from "y-codemirror.next";
import type { Awareness } from "y-protocols/awareness";
import type * as Y from "yjs";
import { folding } from "../folding/folding.ts";
import { meaningGloss, pairs, pasting, suggestionList } from "../writing/index.ts";
import { arrowsEnter } from "./entering.ts";
import { foundField, foundNews } from "./found.ts";
import { glossField } from "./glosses.ts";
import { type SheetHost, sheetHost } from "./host.ts";
import { lineNumbers } from "./line-numbers.ts";
import { enter, lineBreak } from "./paragraphs.ts";
import { closedInPrint } from "./print.ts";
import { remoteCarets } from "./remote-carets.ts";
import { setAttention, setPressed, sheetField } from "./sheet-field.ts";
import { leaveWorking, workingPlaces } from "./working-place.ts";

export interface EditorOptions {
  readonly parent: HTMLElement;
  readonly text: Y.Text;
  readonly undo: Y.UndoManager;
  readonly awareness: Awareness;
  readonly host: SheetHost;
  readonly nonce: string;
  onUpdate(update: ViewUpdate): void;
}

/** The paper's text as a typeset sheet, bound to the shared text. */
export function createSheetEditor(options: EditorOptions): EditorView {
  const { host, text, undo, awareness } = options;
  return new EditorView({
    parent: options.parent,
    state: EditorState.create({
      doc: text.toString(),
      extensions: [
        ground(options.nonce, host.writes, "Text of the paper"),
        sheetHost.of(host),
        host.writes ? [suggestionList, meaningGloss, pairs, pasting] : [],
        keymap.of([{ key: "Enter", run: enter }, { key: "Shift-Enter", run: lineBreak }, leaveWorking, ...arrowsEnter]),
        keymap.of(yUndoManagerKeymap),
        keymap.of(defaultKeymap),
        yCollab(text, null, { undoManager: undo }),
        foundField,
        foundNews,
        sheetField,
        workingPlaces,
        folding,
        glossField,
        lineNumbers,
        gutters({ fixed: false }),
        attention,
        closedInPrint,
        remoteCarets(text, awareness),
        EditorView.updateListener.of(options.onUpdate),
      ],
    }),
  });
}

/** The BibTeX of the bibliography: plain source, bound to the shared text. */
export function createSourceEditor(
  options: Pick<EditorOptions, "parent" | "text" | "undo" | "nonce"> & { readonly writes: boolean },
): EditorView {
  return new EditorView({
    parent: options.parent,
    state: EditorState.create({
      doc: options.text.toString(),
      extensions: [
        ground(options.nonce, options.writes, "BibTeX of the bibliography"),
        keymap.of(yUndoManagerKeymap),
        keymap.of(defaultKeymap),
        yCollab(options.text, null, { undoManager: options.undo }),
      ],
    }),
  });
}

/** Heights of the rule at the top and of the tail line, with room, under which the caret must not be lost. */
const RULE_PX = 108;
const TAIL_PX = 68;

/** What both have. Tab is not taken, so that it leaves the text; the caret is drawn in ink. */
function ground(nonce: string, writes: boolean, label: string): Extension {
  return [
    nonce === "" ? [] : EditorView.cspNonce.of(nonce),
    EditorState.readOnly.of(!writes),
    EditorView.editable.of(writes),
    EditorView.lineWrapping,
    EditorView.scrollMargins.of(() => ({ top: RULE_PX, bottom: TAIL_PX })),
    drawSelection(),
    EditorView.contentAttributes.of({
      "aria-label": label,
      "aria-readonly": String(!writes),
      spellcheck: "true",
      autocorrect: "off",
    }),
  ];
}

/** Whether the text has the person's attention, the parts within it counted; and whether the pointer is pressed in it. */
const attention = EditorView.domEventHandlers({
  focusin(_event, view) {
    if (!view.state.field(sheetField).attention) view.dispatch({ effects: setAttention.of(true) });
  },
  focusout(event, view) {
    const next = event.relatedTarget;
    if (next instanceof Node && view.dom.contains(next)) return;
    // After the editor's own handling of the event.
    setTimeout(() => {
      if (view.dom.isConnected && !view.dom.contains(document.activeElement)) {
        view.dispatch({ effects: setAttention.of(false) });
      }
    });
  },
  pointerdown(event, view) {
    if (event.button !== 0) return;
    view.dispatch({ effects: setPressed.of(true) });
    const release = () => {
      for (const name of RELEASES) window.removeEventListener(name, release);
      if (view.dom.isConnected) view.dispatch({ effects: setPressed.of(false) });
    };
    for (const name of RELEASES) window.addEventListener(name, release);
  },
});

const RELEASES = ["pointerup", "pointercancel"] as const;
