import type { Text } from "mdast";
import { nearestSpelling } from "../spelling/index.ts";
import type { Reading } from "./reading.ts";

const directiveNames = ["value", "ref", "cite"];

/** Reports marks left in plain text that were meant as something: an open display, an open or misspelt directive. */
export function noticeLooseMarks(reading: Reading, node: Text): void {
  const { value } = node;
  if (value.includes("$$")) noticeDollars(reading, node);
  if (value.includes("[")) noticeDirectives(reading, node);
}

function noticeDollars(reading: Reading, node: Text): void {
  const place = reading.placeIn(node, node.value);
  const at = place(node.value.indexOf("$$"));
  if (!reading.text.startsWith("$$", at) || reading.text.startsWith("\\", at - 1)) return;
  const message = "Nothing closes this display: it needs $$ after its last line, and no blank line before that.";
  reading.report(at, at + 2, message);
}

function noticeDirectives(reading: Reading, node: Text): void {
  const place = reading.placeIn(node, node.value);
  for (const match of node.value.matchAll(/(?<!:):([a-z]{2,10})\[/g)) {
    const name = match[1] ?? "";
    const from = place(match.index);
    const nearest = nearestSpelling(name, directiveNames);
    if (nearest === null || !reading.text.startsWith(":", from)) continue;
    if (nearest === name) {
      reading.report(from, from + name.length + 2, `Nothing closes the bracket of this :${name}[…].`);
      continue;
    }
    const fix = { label: `Write :${nearest}`, from: from + 1, to: from + 1 + name.length, insert: nearest };
    const message = `“:${name}” is plain text. Did you mean “:${nearest}”?`;
    reading.report(from, from + name.length + 1, message, { severity: "warning", fix });
  }
}
