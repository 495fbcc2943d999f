import { Text } from "@codemirror/state";
import { expect, test } from "vitest";
import { hasEmptyBody } from "../../../app/editor/first/empty-body.ts";

const isEmpty = (text: string) => hasEmptyBody(Text.of(text.split("\n")));
const FRONT = "---\ntitle: A\n---\n";

test.each([
  ["nothing", ""],
  ["blank lines", "\n \n"],
  ["front matter", FRONT],
  ["parameters", `${FRONT}\n\`\`\`parameters\nbeta: 1\n\`\`\`\n\n`],
  ["two cells of them", "```parameters\na: 1\n```\n~~~~parameters b\nc: 2\n~~~~\n"],
  ["a comment", "<!-- to be\n\nwritten -->\n"],
])("is empty with %s alone", (_name, text) => expect(isEmpty(text)).toBe(true));

test.each([
  ["a word", "A"],
  ["a heading", `${FRONT}## A`],
  ["a cell", "```process p\ndrift: 1\nrate: 1\n```\n"],
  ["a cell begun", "```"],
  ["front matter that is not closed", "---\ntitle: A\n"],
  ["a word below parameters", "```parameters\nbeta: 1\n```\nA\n"],
  ["much", " \n".repeat(5000)],
])("is not with %s", (_name, text) => expect(isEmpty(text)).toBe(false));
