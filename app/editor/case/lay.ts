import { spotOfNumber, spotOfPointer } from "../writing/spot.ts";
import { gapAfter } from "./gap.ts";
import type { Setting, Stretch } from "./types.ts";

/** An edit of the text, with what is chosen afterwards. */
export interface Laid {
  readonly changes: readonly { readonly from: number; readonly to: number; readonly insert: string }[];
  /** In the text after the edit. */
  readonly select: Stretch;
  /** The line at which it will stand, counted from 1. */
  readonly line: number;
}

/** How something is set into a text at the caret: nothing of what stands there is taken away. */
export function lay(text: string, caret: number, setting: Setting): Laid {
  switch (setting.set) {
    case "block":
      return layBlock(text, caret, setting.text, setting.select, setting.outermost);
    case "number": {
      const spot = spotOfNumber(text, caret);
      const quoted = QUOTED[spot.spot];
      const { formula } = setting;
      const written = `${quoted[0]}${formula}${quoted[1]}`;
      const end = { from: written.length, to: written.length };
      const within = setting.select;
      const select = within === null ? end : { from: within.from + quoted[0].length, to: within.to + quoted[0].length };
      if (spot.spot === "below") return layBlock(text, caret, written, select, false);
      return layInline(text, spot.at, written, select);
    }
    case "inline": {
      const spot = spotOfPointer(text, caret);
      const end = { from: setting.text.length, to: setting.text.length };
      if (spot.spot === "below") return layBlock(text, caret, setting.text, end, false);
      return layInline(text, spot.at, setting.text, end);
    }
    case "footnote":
      return layFootnote(text, caret, setting.label);
  }
}

const QUOTED = {
  prose: [":value[", "]"],
  math: ["\\value{", "}"],
  working: ["", ""],
  below: [":value[", "]"],
} as const;

function layInline(text: string, at: number, written: string, select: Stretch): Laid {
  return {
    changes: [{ from: at, to: at, insert: written }],
    select: { from: at + select.from, to: at + select.to },
    line: lineOf(text, at),
  };
}

/** Between blank lines, below the paragraph in which the caret is. */
function layBlock(text: string, caret: number, written: string, select: Stretch, outermost: boolean): Laid {
  const { from, to, before, after } = gapAfter(text, caret, outermost);
  const start = from + before.length;
  return {
    changes: [{ from, to, insert: `${before}${written}${after}` }],
    select: { from: start + select.from, to: start + select.to },
    line: lineOf(`${text.slice(0, from)}${before}`, start),
  };
}

/** The mark at the caret, the note below the paragraph with its words chosen. */
function layFootnote(text: string, caret: number, label: string): Laid {
  const mark = `[^${label}]`;
  const spot = spotOfPointer(text, caret);
  const words = "The note.";
  const note = `${mark}: ${words}`;
  const chosen = { from: note.length - words.length, to: note.length };
  if (spot.spot === "below") return layBlock(text, caret, note, chosen, true);
  if (isBlank(text, spot.at)) {
    const shift = mark.length + 2;
    const both = { from: chosen.from + shift, to: chosen.to + shift };
    return layBlock(text, caret, `${mark}\n\n${note}`, both, true);
  }
  const laid = layBlock(text, spot.at, note, chosen, true);
  return {
    changes: [{ from: spot.at, to: spot.at, insert: mark }, ...laid.changes],
    select: { from: laid.select.from + mark.length, to: laid.select.to + mark.length },
    line: lineOf(text, spot.at),
  };
}

function isBlank(text: string, at: number): boolean {
  return /^[ \t]*(?:\n|$)/.test(text.slice(text.lastIndexOf("\n", at - 1) + 1));
}

function lineOf(text: string, at: number): number {
  return text.slice(0, at).split("\n").length;
}
