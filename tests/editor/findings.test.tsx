import { renderToStaticMarkup } from "react-dom/server";
import { expect, test } from "vitest";
import { StateLine } from "../../app/editor/parts/state-line.tsx";
import { SheetReader } from "../../app/editor/reading/sheet-reader.ts";
import { computed, tellText } from "./sample.ts";
import { silentHost } from "./silent-host.ts";

const PAPER = `\`\`\`parameters
mu: 2
\`\`\`

\`\`\`check small
that: mu < 1
because: it was so yesterday
\`\`\`

\`\`\`check sound
that: mu < 3
\`\`\`
`;

const HOST = silentHost();

function sheetOf(text: string) {
  const reader = new SheetReader();
  reader.hear(tellText(text));
  const { shown, results } = computed(text);
  reader.hear(shown);
  reader.hear({ tell: "results", results });
  return reader.sheet();
}

function words(slot: string): string {
  const face = sheetOf(PAPER).cells.find((cell) => cell.slot === slot);
  if (face === undefined) throw new Error(`There is no cell ${slot}.`);
  return renderToStaticMarkup(<StateLine face={face} open={false} host={HOST} />).replace(/<[^>]+>/g, "");
}

test("a check that fails is marked with its words where it stands on the sheet; one that holds is silent", () => {
  expect(words("small")).toContain("‡ 2 &lt; 1 does not hold. It should hold because: it was so yesterday");
  expect(words("sound")).not.toContain("‡");
});

test("it is an erratum", () => {
  expect(sheetOf(PAPER).errata.map(({ mark, title, line }) => [mark, title, line])).toEqual([["‡", "check small", 5]]);
  expect(sheetOf(PAPER.replace("mu: 2", "mu: 0")).errata).toEqual([]);
});
