// @vitest-environment jsdom
import { EditorState } from "@codemirror/state";
import { EditorView, keymap } from "@codemirror/view";
import { afterEach, beforeAll, describe, expect, test, vi } from "vitest";
import { SheetReader } from "../../app/editor/reading/sheet-reader.ts";
import { sheetHost } from "../../app/editor/text/host.ts";
import { turnWorking } from "../../app/editor/text/moving.ts";
import { applyModel, setAttention, sheetField } from "../../app/editor/text/sheet-field.ts";
import { leaveWorking, openSlotAt, workingPlaces } from "../../app/editor/text/working-place.ts";
import { likeABrowser } from "./dom.ts";
import { SAMPLE, tellText } from "./sample.ts";
import { silentHost } from "./silent-host.ts";

beforeAll(likeABrowser);
const open: EditorView[] = [];
afterEach(() => {
  for (const view of open.splice(0)) view.destroy();
});

function sheetOf(text: string, writes = true) {
  const host = silentHost();
  const view = new EditorView({
    parent: document.body.appendChild(document.createElement("div")),
    state: EditorState.create({
      doc: text,
      extensions: [
        sheetHost.of(host),
        EditorState.readOnly.of(!writes),
        keymap.of([leaveWorking]),
        sheetField,
        workingPlaces,
      ],
    }),
  });
  open.push(view);
  read(view);
  return { view, host };
}

function read(view: EditorView): void {
  const reader = new SheetReader();
  reader.hear(tellText(view.state.doc.toString()));
  const since = view.state.changes().desc;
  view.dispatch({ effects: applyModel.of({ model: reader.sheet(), doc: view.state.doc, since }) });
}

/** Puts the caret into the working of the cell that begins so. */
function enterCell(view: EditorView, fence: string): void {
  const anchor = view.state.doc.toString().indexOf(fence) + fence.length + 1;
  view.dispatch({ effects: setAttention.of(true), selection: { anchor } });
}

const openCells = (view: EditorView) => [...view.contentDOM.querySelectorAll<HTMLElement>(".hl-open-cell")];
const linesOf = (cell: HTMLElement | undefined) =>
  [...(cell?.querySelectorAll(".hl-working") ?? [])].map(({ textContent }) => textContent);
const PRESS = { key: "Escape", bubbles: true, cancelable: true };

describe("An open working", () => {
  test("stands with its plate and its head in one element, and its lines are those of the text", () => {
    const { view } = sheetOf(SAMPLE);
    expect(openCells(view)).toEqual([]);
    enterCell(view, "```counts K");
    const [cell, ...others] = openCells(view);
    expect(others).toEqual([]);
    expect(cell?.querySelectorAll(".hl-cell")).toHaveLength(1);
    expect(cell?.querySelector(".hl-working-head")?.textContent).toMatch(/^Working of Figure 1/);
    expect(linesOf(cell)).toEqual([
      "```counts K",
      "of: larvae",
      "start: 1",
      "up_to: 6",
      "caption: The law of $K$.",
      "```",
    ]);
  });

  test("keeps its place while lines come above it and in it, and when its name changes", () => {
    const { view } = sheetOf(SAMPLE);
    enterCell(view, "```counts K");
    const at = view.state.doc.toString().indexOf("## Model");
    view.dispatch({ changes: { from: at, insert: "More.\n\n" } });
    const fence = view.state.doc.toString().indexOf("counts K");
    view.dispatch({
      changes: [
        { from: fence + 7, to: fence + 8, insert: "Kay" },
        { from: fence + 8, insert: "\nshow: table" },
      ],
    });
    expect(linesOf(openCells(view)[0]).slice(0, 3)).toEqual(["```counts Kay", "show: table", "of: larvae"]);
    read(view);
    expect(openCells(view)).toHaveLength(1);
    expect(openCells(view)[0]?.querySelector(".hl-working-head")?.textContent).toMatch(/^Working of Table/);
  });

  test("is put away with Esc, and from its head", () => {
    const { view, host } = sheetOf(SAMPLE);
    enterCell(view, "```counts K");
    const slot = openSlotAt(view.state, view.state.selection.main.head);
    view.contentDOM.dispatchEvent(new KeyboardEvent("keydown", PRESS));
    expect(openCells(view)).toEqual([]);
    enterCell(view, "```counts K");
    const putAway = vi.spyOn(host.commands, "putAway");
    openCells(view)[0]
      ?.querySelector("button[aria-label^='Put away, working']")
      ?.dispatchEvent(new MouseEvent("click"));
    expect(putAway).toHaveBeenCalledWith(slot);
  });

  test("put away before another cell leaves the caret between the two", () => {
    const { view } = sheetOf(SAMPLE);
    enterCell(view, "```process larvae");
    view.contentDOM.dispatchEvent(new KeyboardEvent("keydown", PRESS));
    expect(openCells(view)).toEqual([]);
    expect(view.state.doc.lineAt(view.state.selection.main.head).text).toBe("");
  });

  test("of one who only reads stays open, several of them at once", () => {
    const { view } = sheetOf(SAMPLE, false);
    const slots = view.state.field(sheetField).model?.cells.map(({ slot }) => slot) ?? [];
    for (const slot of slots.slice(1, 3)) turnWorking(view, slot, true, false);
    expect(openCells(view)).toHaveLength(2);
  });

  test("of a cell at the very start of the text stands beneath its plate", () => {
    const { view } = sheetOf("```process larvae\ndrift: 2\nrate: 1\n```\n\nWords.\n");
    enterCell(view, "```process larvae");
    expect(openCells(view)).toEqual([]);
    expect(view.contentDOM.querySelectorAll(".hl-working")).toHaveLength(4);
  });
});
