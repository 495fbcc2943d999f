import { expect, test } from "vitest";
import { groupPeople } from "../../app/routes/parts/people-groups.ts";
import { authorsInWords, groupShelf, type ShelfPaper } from "../../app/routes/parts/shelf-groups.ts";

function paper(id: string, changed: Partial<ShelfPaper>): ShelfPaper {
  return {
    id,
    title: id,
    authors: "",
    specimen: false,
    changedAt: "",
    role: "owner",
    putBy: false,
    refereed: false,
    ...changed,
  };
}

test("the shelf says what is expected of one: to write, to wait, to read, nothing", () => {
  const groups = groupShelf([
    paper("mine", {}),
    paper("ours", { role: "author" }),
    paper("out", { role: "author", refereed: true }),
    paper("judged", { role: "referee", refereed: true }),
    paper("read", { role: "reader" }),
    paper("old", { putBy: true, refereed: true }),
  ]);
  expect(groups.map(({ name, papers }) => [name, papers.map(({ id }) => id)])).toEqual([
    ["On the desk", ["mine", "ours"]],
    ["With referees", ["out"]],
    ["To read", ["judged", "read"]],
    ["Put by", ["old"]],
  ]);
});

test("an empty shelf has an empty desk and no other group", () => {
  expect(groupShelf([])).toEqual([{ name: "On the desk", papers: [] }]);
});

const MEMBERS = (["reader", "author", "owner", "referee"] as const).map((role) => ({
  personId: role,
  name: role,
  login: role,
  role,
}));

test("those who write know everybody; referees and readers know the authors and themselves", () => {
  const known = (standing: "owner" | "author" | "referee" | "reader") =>
    groupPeople(MEMBERS, { standing, personId: standing }).map(({ members }) => members.map(({ name }) => name));
  expect(known("owner")).toEqual([["owner", "author"], ["referee"], ["reader"]]);
  expect(known("author")).toEqual(known("owner"));
  expect(known("referee")).toEqual([["owner", "author"], ["referee"], []]);
  expect(known("reader")).toEqual([["owner", "author"], [], ["reader"]]);
});

test.each([
  ["Inês Valadão", "by you alone"],
  ["Inês Valadão, Tormod Hagelund", "with Tormod Hagelund"],
  ["Tormod Hagelund, Inês Valadão, Wanjiru Kamande", "with Tormod Hagelund and Wanjiru Kamande"],
  ["Marguerite Ostrander, Dipankar Lahiri", "Marguerite Ostrander and Dipankar Lahiri"],
  ["", ""],
])("the authors %j are, for Inês, %j", (authors, words) => {
  expect(authorsInWords(authors, "Inês Valadão")).toBe(words);
});
