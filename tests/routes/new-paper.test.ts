import { expect, test } from "vitest";
import { planPaper } from "../../app/cells/index.ts";
import { hasEmptyBody } from "../../app/editor/first/empty-body.ts";
import { readPaper, UNTITLED } from "../../app/paper/index.ts";
import { copyOf, emptyPaper } from "../../app/routes/parts/new-paper.ts";

test.each(["Inês Valadão", 'O"Brien: #1 {x}', "- *odd*\\name's", "佐藤"])(
  "the empty paper of %s reads and plans without a fault",
  (name) => {
    const paper = readPaper(emptyPaper(name), "");
    expect(paper.problems).toEqual([]);
    expect(paper.front).toMatchObject({ title: UNTITLED, authors: [{ name }] });
    const plan = planPaper(paper);
    expect(plan.problems).toEqual([]);
    expect(plan.parameters.map(({ name: parameter }) => parameter)).toEqual(["beta"]);
    expect(hasEmptyBody({ length: 0, toString: () => emptyPaper(name) })).toBe(true);
  },
);

test.each([
  ["plain", "---\ntitle: Larvae\nauthors: []\n---\nText", "Copy of Larvae"],
  ["quoted, with signs of YAML", "---\ntitle: 'Fronts: a \"note\"'\n---\n", 'Copy of Fronts: a "note"'],
  [
    "folded over lines",
    "---\nmacros:\n  \\E: x\ntitle: >-\n  How many\n  reach the shore?\nabstract: a\n---\n",
    "Copy of How many reach the shore?",
  ],
])("a copy has another title, and nothing else: %s", (_form, text, title) => {
  const copy = copyOf(text);
  expect(copy.title).toBe(title);
  const [before, after] = [readPaper(text, ""), readPaper(copy.text, "")];
  expect(after.front.title).toBe(title);
  const { authors, abstract, macros } = before.front;
  expect(after.front).toMatchObject({ authors, abstract, macros });
  expect(after.problems.length).toBeLessThanOrEqual(before.problems.length);
  expect(copy.text.split("---\n").at(-1)).toBe(text.split("---\n").at(-1));
});

test.each(["No front matter", "---\nabstract: a\n---\nx", "---\ntitle: [a, b\n---\n", "---\ntitle: x"])(
  "a text without a title stays as it is: %j",
  (text) => {
    expect(copyOf(text)).toEqual({ text, title: null });
  },
);
