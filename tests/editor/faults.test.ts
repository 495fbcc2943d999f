import { expect, test } from "vitest";
import type { CellResult } from "../../app/cells/index.ts";
import { SheetReader } from "../../app/editor/reading/sheet-reader.ts";
import { computed, tellText } from "./sample.ts";

/** A check whose kept result is no such thing, a law whose kept result has lost its numbers, and sound neighbours. */
const PAPER = `\`\`\`parameters
mu: 2
\`\`\`

\`\`\`check small
that: mu < 3
\`\`\`

\`\`\`process larvae
drift: mu
rate: 1
\`\`\`

\`\`\`counts K
of: larvae
start: 1
up_to: 4
\`\`\`

\`\`\`formula twice
two: 2 * mu
\`\`\`

One :value[twice.two], another :value[K(2)].
`;

/** As a disk or a program elsewhere may have spoilt it. */
function spoilt(result: CellResult): CellResult {
  return result.kind === "check" || result.kind === "counts" ? { ...result, data: null } : result;
}

test("a result that cannot be read is said at its cell, and the rest of the sheet is answered", () => {
  const reader = new SheetReader();
  reader.hear(tellText(PAPER));
  const { shown, results } = computed(PAPER);
  reader.hear(shown);
  reader.hear({ tell: "results", results: results.map(spoilt) });
  const model = reader.sheet();
  const states = Object.fromEntries(model.cells.map(({ slot, state }) => [slot, state]));
  expect(states).toMatchObject({ small: "failed", larvae: "current", twice: "current" });
  const words = model.cells.find(({ slot }) => slot === "small")?.words;
  expect(JSON.stringify(words)).toMatch(/check small cannot be told: .*Recompute it, or edit its working/);
  expect(model.errata.some(({ title, mark }) => title === "check small" && mark === "‡")).toBe(true);
  // The plate of the law says why it cannot be drawn; its numbers in the text have no value, the other one has.
  expect(model.views.K?.fault).toBeTruthy();
  const numbers = model.pieces.middle.flatMap((piece) =>
    piece.piece === "set" && piece.content.content === "number" ? [piece.content.number] : [],
  );
  expect(numbers.map(({ formula, known, state }) => [formula, known, state])).toEqual([
    ["twice.two", "4", "current"],
    ["K(2)", "", "failed"],
  ]);
});
