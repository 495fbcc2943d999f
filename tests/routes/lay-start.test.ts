import { describe, expect, test } from "vitest";
import { planPaper } from "../../app/cells/index.ts";
import { readPaper, UNTITLED } from "../../app/paper/index.ts";
import { layStart, STARTS } from "../../app/routes/parts/lay-start.ts";
import { emptyPaper } from "../../app/routes/parts/new-paper.ts";
import { startingPoint } from "../../app/routes/parts/starts.ts";

const AUTHOR = "Tormod O'Hagelund";

function laid(id: string, text: string) {
  const found = layStart(id, text, AUTHOR);
  if (found === null) throw new Error("The start was not laid.");
  return { ...found, paper: readPaper(found.text, found.bibliography) };
}

describe.each(STARTS)("$words laid into an empty paper", ({ id }) => {
  test("is the paper that the shelf begins from it", () => {
    const { text, bibliography } = laid(id, emptyPaper(AUTHOR));
    const start = startingPoint(id);
    expect(text).toBe(start.text(AUTHOR));
    expect(bibliography).toBe(start.bibliography);
  });

  test("keeps the title, the authors and all else that the front matter says already", () => {
    const named = emptyPaper(AUTHOR)
      .replace(UNTITLED, "'Larvae: a note'")
      .replace("authors:\n", "keywords: [mine]\nauthors:\n  - name: Inês Valadão\n    orcid: 0000-0002-1825-0097\n");
    const { paper } = laid(id, named);
    expect([...paper.problems, ...planPaper(paper).problems]).toEqual([]);
    expect(paper.front).toMatchObject({
      title: "Larvae: a note",
      keywords: ["mine"],
      authors: [{ name: "Inês Valadão", orcid: "0000-0002-1825-0097" }, { name: AUTHOR }],
    });
    expect(Object.keys(paper.front.macros)).toContain("\\prob");
  });

  test("is laid into a text without anything as well", () => {
    const { paper } = laid(id, "");
    expect([...paper.problems, ...planPaper(paper).problems]).toEqual([]);
    expect(paper.front.authors.map(({ name }) => name)).toEqual([AUTHOR]);
  });
});

test("nothing is laid over words or parameters of the author's own", () => {
  expect(layStart("sweep", `${emptyPaper(AUTHOR)}Words.\n`, AUTHOR)).toBeNull();
  expect(layStart("sweep", emptyPaper(AUTHOR).replace("value: 1,", "value: 2,"), AUTHOR)).toBeNull();
});
