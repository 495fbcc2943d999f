// @vitest-environment jsdom
import { EditorState } from "@codemirror/state";
import { EditorView } from "@codemirror/view";
import fc from "fast-check";
import type { Table } from "mdast";
import { afterEach, beforeAll, describe, expect, test, vi } from "vitest";
import { pasting } from "../../../app/editor/writing/index.ts";
import { gridOfPage, gridOfTabs, tableText } from "../../../app/editor/writing/table-text.ts";
import { plainText, readPaper } from "../../../app/paper/index.ts";
import { likeABrowser } from "../dom.ts";

beforeAll(likeABrowser);
const open: EditorView[] = [];
afterEach(() => {
  for (const view of open.splice(0)) view.destroy();
});

/** The words in a paper's first table, as the paper's own reader finds them. */
function readBack(text: string): string[][] | null {
  const table = readPaper(text, "").root.children.find((node): node is Table => node.type === "table");
  return table?.children.map((row) => row.children.map((cell) => plainText(cell.children))) ?? null;
}

describe("A table from elsewhere", () => {
  test("of tabs and lines, its numbers set right", () => {
    const grid = gridOfTabs("n\tlaw\r\n1\tbinary\r\n-2.5\tternary\r\n");
    expect(grid).toEqual([
      ["n", "law"],
      ["1", "binary"],
      ["-2.5", "ternary"],
    ]);
    expect(tableText(grid ?? [])).toBe("| n | law |\n| ---: | --- |\n| 1 | binary |\n| -2.5 | ternary |");
  });

  test("is none where rows differ, where there is one of them, or where cells hold lines", () => {
    expect(gridOfTabs("a\tb")).toBeNull();
    expect(gridOfTabs("a\tb\nc")).toBeNull();
    expect(gridOfTabs("words\nand words")).toBeNull();
    expect(gridOfTabs('a\t"b\nc"\td')).toBeNull();
  });

  test("of a page, if that is all there is and no cell spans others", () => {
    const table = "<table><tr><th>x</th><th>y</th></tr><tr><td> 1 </td><td>a  b</td></tr></table>";
    expect(gridOfPage(`<style>td {}</style>${table}`)).toEqual([
      ["x", "y"],
      ["1", "a b"],
    ]);
    expect(gridOfPage(`<p>See</p>${table}`)).toBeNull();
    expect(gridOfPage(table.replace("<td>", "<td colspan=2>"))).toBeNull();
    expect(gridOfPage("<p>x</p>")).toBeNull();
  });

  test("is read by the paper as the words that it held, whatever they are", () => {
    const cell = fc.stringMatching(/^[a-z0-9$*_|`<>[\]:{}.~!#&-]{1,8}$/).map((words) => words.replace(/&/g, "+"));
    fc.assert(
      fc.property(fc.array(fc.tuple(cell, cell), { minLength: 2, maxLength: 4 }), (rows) => {
        expect(readBack(tableText(rows))).toEqual(rows.map((row) => [...row]));
      }),
    );
  });
});

describe("Pasting", () => {
  function paste(text: string, at: number, given: { plain?: string; html?: string; files?: File[] }) {
    const state = EditorState.create({ doc: text, selection: { anchor: at }, extensions: [pasting] });
    const view = new EditorView({ parent: document.body.appendChild(document.createElement("div")), state });
    open.push(view);
    const event = new Event("paste", { bubbles: true, cancelable: true });
    const getData = (type: string) => (type === "text/html" ? given.html : given.plain) ?? "";
    Object.assign(event, { clipboardData: { getData, files: given.files ?? [] } });
    view.contentDOM.dispatchEvent(event);
    return view;
  }
  const TABS = "n\tp\n1\t0.5";
  const TABLE = "| n | p |\n| ---: | ---: |\n| 1 | 0.5 |";

  test("a table becomes the paper's, and is left as it came when that is wanted", async () => {
    const view = paste("Before.After.", 7, { plain: TABS });
    expect(view.state.doc.toString()).toBe(`Before.\n\n${TABLE}\n\nAfter.`);
    await vi.waitFor(() => expect(view.dom.querySelector("[role=status]")).not.toBeNull(), { timeout: 20_000 });
    expect(view.dom.querySelector("[role=status]")?.textContent).toContain("a table of 2 rows and 2 columns");
    view.dom.querySelector<HTMLButtonElement>("[role=status] button")?.click();
    expect(view.state.doc.toString()).toBe(`Before.${TABS}After.`);
  }, 60_000);

  test("within a working or mathematics nothing is changed", () => {
    for (const text of ["```check c\n", "So $", "---\ntitle: x\n"]) {
      expect(paste(text, text.length, { plain: TABS }).state.doc.toString()).not.toContain("|");
    }
    const after = "---\ntitle: x\n---\n\n";
    expect(paste(after, after.length, { plain: TABS }).state.doc.toString()).toBe(after + TABLE);
  });

  test("an image is refused in words, and the text stays", async () => {
    const view = paste("Words.", 6, { files: [new File(["x"], "x.png", { type: "image/png" })] });
    expect(view.state.doc.toString()).toBe("Words.");
    await vi.waitFor(() => expect(view.dom.querySelector("[role=status]")?.textContent).toMatch(/^Images cannot/), {
      timeout: 20_000,
    });
  }, 60_000);
});
