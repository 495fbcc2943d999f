// @vitest-environment jsdom
import { acceptCompletion, completionStatus, currentCompletions, startCompletion } from "@codemirror/autocomplete";
import { EditorState } from "@codemirror/state";
import { EditorView, runScopeHandlers } from "@codemirror/view";
import { afterEach, beforeAll, describe, expect, test, vi } from "vitest";
import { SheetReader } from "../../../app/editor/reading/sheet-reader.ts";
import { glossField } from "../../../app/editor/text/glosses.ts";
import { sheetHost } from "../../../app/editor/text/host.ts";
import { applyModel, sheetField } from "../../../app/editor/text/sheet-field.ts";
import { suggestionList } from "../../../app/editor/writing/index.ts";
import { likeABrowser } from "../dom.ts";
import { SAMPLE, tellText } from "../sample.ts";
import { silentHost } from "../silent-host.ts";

beforeAll(likeABrowser);

/** A busy machine takes its time. */
const PATIENCE = { timeout: 20_000 };
vi.setConfig({ testTimeout: 60_000 });

const open: EditorView[] = [];
afterEach(() => {
  for (const view of open.splice(0)) view.destroy();
});

/** The sample with more after it, the caret at its end. */
function sheetWith(more: string): EditorView {
  const doc = `${SAMPLE}\n${more}`;
  const view = new EditorView({
    parent: document.body.appendChild(document.createElement("div")),
    state: EditorState.create({
      doc,
      selection: { anchor: doc.length },
      extensions: [sheetHost.of(silentHost()), suggestionList, sheetField, glossField],
    }),
  });
  open.push(view);
  const reader = new SheetReader();
  reader.hear(tellText(doc));
  view.dispatch({
    effects: applyModel.of({ model: reader.sheet(), doc: view.state.doc, since: view.state.changes().desc }),
  });
  view.focus();
  return view;
}

function type(view: EditorView, text: string) {
  const at = view.state.selection.main.head;
  view.dispatch({
    changes: { from: at, insert: text },
    selection: { anchor: at + text.length },
    userEvent: "input.type",
  });
}

async function settled(view: EditorView) {
  await vi.waitFor(() => expect(completionStatus(view.state)).toBe("active"), PATIENCE);
  // Within this time an acceptance is taken for a slip of the hand.
  await new Promise((done) => setTimeout(done, 90));
}

const lastLine = (view: EditorView) => view.state.doc.line(view.state.doc.lines).text;
const labels = (view: EditorView) => currentCompletions(view.state).map(({ label }) => label);

describe("Suggestions on the sheet", () => {
  test("come while one writes, are named for those who listen, and one is accepted with Tab", async () => {
    const view = sheetWith("As in ");
    type(view, ":");
    type(view, "r");
    await settled(view);
    expect(labels(view)[0]).toBe("ref");
    expect(runScopeHandlers(view, new KeyboardEvent("keydown", { key: "Tab" }), "editor")).toBe(true);
    expect(lastLine(view)).toBe("As in :ref[]");
    // What may be referred to follows at once.
    await settled(view);
    expect(labels(view).sort()).toEqual(["K", "kpp", "model", "shift"]);
    await vi.waitFor(() => expect(view.dom.querySelector("[role=listbox]")).not.toBeNull(), PATIENCE);
    const list = view.dom.querySelector("[role=listbox]");
    expect(list?.getAttribute("aria-label")).toBe("Suggestions");
    expect(view.contentDOM.getAttribute("aria-activedescendant")).toBe(
      list?.querySelector("[aria-selected]")?.id ?? "none",
    );
    type(view, "sh");
    await settled(view);
    expect(acceptCompletion(view)).toBe(true);
    expect(lastLine(view)).toBe("As in :ref[shift]");
  });

  test("with their meaning, its mathematics set", async () => {
    const view = sheetWith(":ref[");
    startCompletion(view);
    await settled(view);
    await vi.waitFor(() => expect(view.dom.querySelectorAll(".hl-suggestion-meaning")).toHaveLength(4), PATIENCE);
    const words = [...view.dom.querySelectorAll(".hl-suggestion-meaning")].map((each) => each.textContent);
    expect(words.some((each) => each?.startsWith("Figure 1: The law of"))).toBe(true);
    expect(view.dom.querySelector(".hl-suggestion-meaning .katex")).not.toBeNull();
  });

  test("Esc leaves, and does nothing where there are none; Tab then leaves the text as before", async () => {
    const view = sheetWith(":cite[");
    startCompletion(view);
    await settled(view);
    const press = (key: string) => runScopeHandlers(view, new KeyboardEvent("keydown", { key }), "editor");
    expect(press("Escape")).toBe(true);
    expect(completionStatus(view.state)).toBeNull();
    expect(press("Escape")).toBe(false);
    expect(press("Tab")).toBe(false);
  });

  test("a word that is there in full suggests nothing, so that Enter begins a line", async () => {
    const view = sheetWith("As :cite[");
    type(view, "kesten1978");
    expect(completionStatus(view.state)).toBe("pending");
    await vi.waitFor(() => expect(completionStatus(view.state)).toBeNull(), PATIENCE);
  });

  test("a bracket that stands there already is not written twice", async () => {
    const view = sheetWith(":value[sqr(4)]");
    view.dispatch({ selection: { anchor: view.state.doc.length - 4 } });
    startCompletion(view);
    await settled(view);
    expect(acceptCompletion(view)).toBe(true);
    expect(lastLine(view)).toBe(":value[sqrt(4)]");
    expect(view.state.selection.main.head).toBe(view.state.doc.length - 3);
  });
});
