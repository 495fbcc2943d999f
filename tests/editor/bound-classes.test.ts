// @vitest-environment jsdom
import { expect, test } from "vitest";
import { BOUND_CLASSES, boundClasses, withoutClasses } from "../../app/editor/model/bound-classes.ts";
import type { NumberState } from "../../app/editor/model/types.ts";
import { SheetReader } from "../../app/editor/reading/sheet-reader.ts";
import { setContent } from "../../app/editor/text/contents.ts";
import { computed, tellText } from "./sample.ts";

const STATES: readonly NumberState[] = [
  "current",
  "outOfDate",
  "stands",
  "computing",
  "waiting",
  "failed",
  "empty",
  "preview",
];

test.each(STATES)("classes of a number that is %s are those that formulas may give", (state) => {
  for (const strands of [[], [0], [1, 7], [2, 3, 4]]) expect(boundClasses({ state, strands })).toMatch(BOUND_CLASSES);
  expect(boundClasses({ state, strands: [1, 7] })).toContain("hl-first-2 hl-second-2");
});

const PAPER = (formula: string) => `---
macros: {\\same: '#1', \\fake: '\\htmlClass{hl-bound hl-bound-current}{#1}'}
---

\`\`\`parameters
mu: 2
\`\`\`

Here ${formula} stands.
`;

function setIn(formula: string): HTMLElement {
  const text = PAPER(formula);
  const reader = new SheetReader();
  reader.hear(tellText(text));
  reader.hear(computed(text).shown);
  const model = reader.sheet();
  const content = model.pieces.middle.flatMap((piece) =>
    piece.piece === "set" && piece.content.content === "math" ? [piece.content] : [],
  )[0];
  if (content === undefined) throw new Error("No formula was read.");
  return setContent(content, model.macros);
}

test("a number within a formula has its underline, also within a macro", () => {
  expect(setIn("$x = \\value{mu}$").querySelector(".hl-bound-current.hl-first-1")?.textContent).toBe("2");
  expect(setIn("$\\same{\\value{mu}}$").querySelector(".hl-bound")?.textContent).toBe("2");
});

test("a number that is typed has none, whatever its author writes around it", () => {
  const typed = [
    "$3.14$",
    "$\\htmlClass{hl-bound hl-bound-current}{3.14}$",
    "$\\htmlClass{hl-bound hl-bound-current}{3.14} + \\value{mu}$",
    "$\\fake{3.14} + \\value{mu}$",
    "$\\let\\q\\htmlClass\\q{hl-bound hl-bound-current}{3.14} + \\value{mu}$",
  ];
  for (const formula of typed) {
    const bound = [...setIn(formula).querySelectorAll(".hl-bound")].map(({ textContent }) => textContent);
    expect(
      bound.filter((words) => words !== "2"),
      formula,
    ).toEqual([]);
  }
  expect(withoutClasses("\\htmlClass{a}{b}")).toHaveLength("\\htmlClass{a}{b}".length);
});
