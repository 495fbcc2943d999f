import { describe, expect, test } from "vitest";
import { lay } from "../../../app/editor/case/lay.ts";
import { namesWritten } from "../../../app/editor/case/names.ts";
import type { Setting } from "../../../app/editor/case/types.ts";

const BLOCK: Setting = { set: "block", text: "BLOCK", select: { from: 1, to: 3 }, outermost: true };
const INNER: Setting = { ...BLOCK, outermost: false };
const NUMBER: Setting = { set: "number", formula: "K(3)", select: { from: 2, to: 3 } };
const REFERENCE: Setting = { set: "inline", text: ":ref[K]" };
const NOTE: Setting = { set: "footnote", label: "a" };

/** What becomes of a text with the caret at `|`; what is chosen afterwards stands between brackets ⟦⟧. */
function laid(marked: string, setting: Setting): string {
  const caret = marked.indexOf("|");
  const text = marked.slice(0, caret) + marked.slice(caret + 1);
  const { changes, select } = lay(text, caret, setting);
  const after = [...changes]
    .reverse()
    .reduce((now, { from, to, insert }) => now.slice(0, from) + insert + now.slice(to), text);
  return `${after.slice(0, select.from)}⟦${after.slice(select.from, select.to)}⟧${after.slice(select.to)}`;
}

describe("a block", () => {
  const CASES: readonly (readonly [string, string, string])[] = [
    ["below the paragraph", "On|e\ntwo.\n\nThree.", "One\ntwo.\n\nB⟦LO⟧CK\n\nThree."],
    ["on a blank line", "One.\n\n|\n\nTwo.", "One.\n\nB⟦LO⟧CK\n\nTwo."],
    ["at the end", "One|.", "One.\n\nB⟦LO⟧CK\n"],
    ["at the end, after a line's end", "One.\n|", "One.\n\nB⟦LO⟧CK\n"],
    ["in a text without anything", "|", "B⟦LO⟧CK\n"],
    [
      "after front matter",
      "---\nti|tle: A\n\nabstract: B\n---\n\nOne.",
      "---\ntitle: A\n\nabstract: B\n---\n\nB⟦LO⟧CK\n\nOne.",
    ],
    [
      "after the cell",
      "```counts K\nof|: p\n\nstart: 1\n```\n\nOne.",
      "```counts K\nof: p\n\nstart: 1\n```\n\nB⟦LO⟧CK\n\nOne.",
    ],
    ["after the display", "$$\na |\n\n= b\n$$\n\nOne.", "$$\na \n\n= b\n$$\n\nB⟦LO⟧CK\n\nOne."],
    [
      "after surroundings",
      ":::remark\nO|ne.\n\nTwo.\n:::\n\nThree.",
      ":::remark\nOne.\n\nTwo.\n:::\n\nB⟦LO⟧CK\n\nThree.",
    ],
    ["after a comment", "<!-- |a\n\nb -->\n\nOne.", "<!-- a\n\nb -->\n\nB⟦LO⟧CK\n\nOne."],
  ];
  for (const [name, before, after] of CASES) test(name, () => expect(laid(before, BLOCK)).toBe(after));

  test("may stand within surroundings, where it is of their kind", () => {
    expect(laid(":::remark\nO|ne.\n:::\n\nTwo.", INNER)).toBe(":::remark\nOne.\n\nB⟦LO⟧CK\n\n:::\n\nTwo.");
    expect(laid(":::remark\nO|ne.\n\nTwo.\n:::", INNER)).toBe(":::remark\nOne.\n\nB⟦LO⟧CK\n\nTwo.\n:::");
  });
});

describe("a number", () => {
  const CASES: readonly (readonly [string, string, string])[] = [
    ["in a sentence", "So | it is.", "So :value[K(⟦3⟧)] it is."],
    ["in mathematics", "So $p=|$ it is.", "So $p=\\value{K(⟦3⟧)}$ it is."],
    ["in a working", "```formula f\na: 1 - |\n```", "```formula f\na: 1 - K(⟦3⟧)\n```"],
    ["in a caption", "```counts K\ncaption: At | it is.\n```", "```counts K\ncaption: At :value[K(⟦3⟧)] it is.\n```"],
    [
      "after the number that the caret is in",
      "So :value[mu|]{digits=3} it is.",
      "So :value[mu]{digits=3}:value[K(⟦3⟧)] it is.",
    ],
    ["after one in mathematics", "$\\value{m|u}$", "$\\value{mu}\\value{K(⟦3⟧)}$"],
    [
      "below a cell, from its own marks",
      "```coun|ts K\nof: p\n```\n\nA.",
      "```counts K\nof: p\n```\n\n:value[K(⟦3⟧)]\n\nA.",
    ],
  ];
  for (const [name, before, after] of CASES) test(name, () => expect(laid(before, NUMBER)).toBe(after));
});

describe("a reference", () => {
  const CASES: readonly (readonly [string, string, string])[] = [
    ["in a sentence", "See |.", "See :ref[K]⟦⟧."],
    ["after mathematics", "By $a|+b$ it is.", "By $a+b$:ref[K]⟦⟧ it is."],
    ["below a display", "$$\na|\n$$\n\nOne.", "$$\na\n$$\n\n:ref[K]⟦⟧\n\nOne."],
    ["below a cell", "```counts K\nof: |p\n```\n\nOne.", "```counts K\nof: p\n```\n\n:ref[K]⟦⟧\n\nOne."],
  ];
  for (const [name, before, after] of CASES) test(name, () => expect(laid(before, REFERENCE)).toBe(after));
});

describe("a footnote", () => {
  test("has its mark at the caret and its words below the paragraph", () => {
    expect(laid("One| two.\nThree.\n\nFour.", NOTE)).toBe("One[^a] two.\nThree.\n\n[^a]: ⟦The note.⟧\n\nFour.");
  });
  test("on a blank line stands with its mark", () => {
    expect(laid("One.\n\n|\n\nTwo.", NOTE)).toBe("One.\n\n[^a]\n\n[^a]: ⟦The note.⟧\n\nTwo.");
  });
});

test("the line is told at which it will stand", () => {
  expect(lay("One\ntwo.\n\nThree.", 1, BLOCK).line).toBe(4);
  expect(lay("One.\n\nTwo.", 7, NUMBER).line).toBe(3);
});

test("names are those of workings, what is read of a cell left out", () => {
  const text = "A word.\n\n```counts K\nof: larvae\nstart: T.s0 + x_0\n```\n\n```formula open\na: K(n)";
  expect([...namesWritten(text)].sort()).toEqual([
    "K",
    "T",
    "a",
    "counts",
    "formula",
    "larvae",
    "n",
    "of",
    "open",
    "start",
    "x_0",
  ]);
});
