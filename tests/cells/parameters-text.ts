import { expect } from "vitest";
import {
  addsParameter,
  changesParameter,
  type FieldChanges,
  movesParameter,
  planPaper,
  removesParameter,
} from "../../app/cells/index.ts";
import { readPaper } from "../../app/paper/index.ts";

/** A paper whose parameters are written in every way there is, with comments. */
export const TEXT = `---
title: On the shore
---

\`\`\`parameters
# of the larvae
beta: 1 # splitting rate
mu: {value: 1.6, min: 1.45, max: 4, note: "drift, offshore"} # the current
x_0:
  value: 0.5   # start
  # where they begin
  note: from the shore
  step: 0.1
spare: 3
\`\`\`

At :value[mu] it is :value[K.mean].

\`\`\`process larvae
drift: mu
rate: beta
\`\`\`

\`\`\`counts K
of: larvae
start: x_0
up_to: 6
\`\`\`

\`\`\`table t
rows: {n: [1, 2, 3]}
columns: {p: K(n)}
\`\`\`

\`\`\`parameters more
R: 400000
\`\`\`
`;

interface Made {
  readonly edits: readonly { readonly from: number; readonly to: number; readonly insert: string }[];
}

/** A text with an edit made, which must be one. */
export function made(text: string, edit: Made | object): string {
  if (!("edits" in edit)) throw new Error(JSON.stringify(edit));
  let after = "";
  let at = 0;
  for (const { from, to, insert } of edit.edits) {
    expect(from).toBeGreaterThanOrEqual(at);
    after += text.slice(at, from) + insert;
    at = to;
  }
  return after + text.slice(at);
}

export const changed = (text: string, name: string, changes: FieldChanges) =>
  made(text, changesParameter(readPaper(text, ""), "", name, changes));
export const added = (text: string, name: string, fields: FieldChanges) =>
  made(text, addsParameter(readPaper(text, ""), "", name, fields));
export const removed = (text: string, name: string) => made(text, removesParameter(readPaper(text, ""), "", name));
export const moved = (text: string, name: string, by: -1 | 1) =>
  made(text, movesParameter(readPaper(text, ""), "", name, by));

export const order = (text: string) => planPaper(readPaper(text, "")).parameters.map(({ name }) => name);
export const faults = (text: string) => [...readPaper(text, "").problems, ...planPaper(readPaper(text, "")).problems];
/** Lines that one text has and another has not. */
export const lines = (text: string, other: string) =>
  text.split("\n").filter((line) => !other.split("\n").includes(line));
