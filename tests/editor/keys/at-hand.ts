import { EditorState } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import { vi } from "vitest";
import { FIRST_BINDING } from "../../../app/editor/keys/binding.ts";
import type { SheetAtHand, Strips } from "../../../app/editor/keys/types.ts";
import type { Desk } from "../../../app/editor/live/desk.ts";
import { FIRST_VIEW } from "../../../app/editor/live/desk-view.ts";
import { createStore } from "../../../app/editor/live/store.ts";
import type { SheetModel } from "../../../app/editor/model/types.ts";
import { SheetReader } from "../../../app/editor/reading/sheet-reader.ts";
import { foundField, foundNews } from "../../../app/editor/text/found.ts";
import { glossField } from "../../../app/editor/text/glosses.ts";
import { sheetHost } from "../../../app/editor/text/host.ts";
import { applyModel, setAttention, sheetField } from "../../../app/editor/text/sheet-field.ts";
import { computed, tellText } from "../sample.ts";
import { silentHost } from "../silent-host.ts";

/** A sheet over a text, read and (unless `computing` is false) computed, with all that is asked of its desk noted. */
export function sheetAtHand(text: string, { writes = true, computing = true } = {}) {
  const host = { ...silentHost(), writes };
  const view = new EditorView({
    parent: document.body.appendChild(document.createElement("div")),
    state: EditorState.create({
      doc: text,
      extensions: [sheetHost.of(host), foundField, foundNews, sheetField, glossField, EditorState.readOnly.of(!writes)],
    }),
  });
  const store = createStore({ ...FIRST_VIEW, ready: true });
  const reader = new SheetReader();
  const asked = {
    recompute: vi.fn(),
    letStand: vi.fn(),
    showWorking: vi.fn(),
    putAway: vi.fn(),
    recomputeAll: vi.fn(),
    tell: vi.fn<(words: string) => void>(),
    say: vi.fn<(words: string) => void>(),
    goTo: vi.fn<(position: number) => void>(),
    show: vi.fn<(position: number) => void>(),
    showPlate: vi.fn<(position: number) => void>(),
    leaveFor: vi.fn<(address: string) => void>(),
  };
  const desk = {
    store,
    view,
    cellCommands: { ...host.commands, ...asked },
    bibliographyNow: () => "",
    valuesNow: async (formulas: readonly string[]) => reader.values(formulas),
    edit: (change: Parameters<EditorView["dispatch"]>[0]) => view.dispatch(change),
    editParameters: (change: Parameters<EditorView["dispatch"]>[0]) => view.dispatch(change),
    ...asked,
  };
  const sheet: SheetAtHand = {
    // Of the desk only what commands ask for; a real one needs a server.
    desk: desk as unknown as Desk,
    view,
    strands: null,
    strips: createStore<Strips>({ open: null, about: null, composing: false, binding: FIRST_BINDING }),
    writes,
    paperId: "p",
    signedIn: true,
    leaveFor: asked.leaveFor,
  };
  const apply = (model: SheetModel) => {
    for (const [slot, shown] of Object.entries(model.views)) if (shown !== null) host.views.set(slot, shown);
    host.macros = model.macros;
    view.dispatch({
      effects: [applyModel.of({ model, doc: view.state.doc, since: view.state.changes().desc }), setAttention.of(true)],
    });
    store.set({ model });
  };
  apply(read(reader, text, computing));
  /** What the worker says of the text as it is by now. */
  const readAgain = () => {
    reader.hear(tellText(view.state.doc.toString(), 2));
    return reader.sheet();
  };
  return { sheet, view, asked, store, apply, readAgain, end: () => view.destroy() };
}

function read(reader: SheetReader, text: string, computing: boolean): SheetModel {
  reader.hear(tellText(text));
  if (computing) {
    const { shown, results } = computed(text);
    reader.hear(shown);
    reader.hear({ tell: "results", results });
  }
  return reader.sheet();
}
