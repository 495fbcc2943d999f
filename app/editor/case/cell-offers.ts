import type { KindWords } from "../model/knowledge.ts";
import { type Asked, answersWord, type Field } from "./asked.ts";
import { fence, fillPlaces, Ground, withoutMarks } from "./ground.ts";
import type { CaseKnowledge, Offer, Stretch } from "./types.ts";

/** Every kind of cell as it would be set in this paper, in the order of the manual. */
export function cellOffers(asked: Asked, knowledge: CaseKnowledge): Offer[] {
  return knowledge.words.kinds.map((kind) => cellOffer(kind, asked, knowledge));
}

function cellOffer(kind: KindWords, asked: Asked, knowledge: CaseKnowledge): Offer {
  const ground = new Ground(asked, knowledge);
  const { offered } = kind;
  const name = offered.name === "" ? "" : ground.take(offered.name);
  const body = fillPlaces(offered.body, ground);
  const before = ground.made.map((cell) => `${cell}\n\n`).join("");
  const { text, select } = chosen(`${before}${fence(kind, name, body)}`);
  return {
    id: `cell ${kind.name}`,
    compartment: "cells",
    title: kind.label,
    line: offered.line,
    words: kind.meaning,
    here: hereWords(ground),
    value: null,
    setting: { set: "block", text, select, outermost: true },
    score: score(kind, asked, ground),
  };
}

/** What stands between the marks of what one changes first, which are taken out. */
export function chosen(marked: string): { readonly text: string; readonly select: Stretch } {
  const from = marked.indexOf("‹");
  const to = marked.indexOf("›") - 1;
  const text = withoutMarks(marked);
  return { text, select: from < 0 ? { from: text.length, to: text.length } : { from, to } };
}

/** "of larvae from x_0", "K.s0 against mu, 1.45 to 4". */
function hereWords(ground: Ground): string {
  const at = (place: string) => ground.at(place);
  const words = [
    ground.has("process") && !ground.has("curve") ? `of ${at("process")}` : "",
    ground.has("start") ? `from ${at("start")}` : "",
    ground.has("drift") ? `drift ${at("drift")}, rate ${at("rate")}` : "",
    ground.has("varied") ? `${at("measured")} against ${at("varied")}, ${at("low")} to ${at("high")}` : "",
    ground.has("curve") && !ground.has("varied") ? `${at("curve")}, ${at("dummy")} from ${at("from")}` : "",
    ground.has("number") ? `with ${at("number")}` : "",
    ground.made.length > 0 ? "and the process it needs" : "",
  ];
  return words.filter((part) => part !== "").join(" ");
}

const [LABEL, SYNONYM, SUMMARY, BOUND] = [5, 3, 1, 1.5];

/** One word at least must be of the kind; the others may name what of the paper goes into it. */
function score(kind: KindWords, { words }: Asked, ground: Ground): number {
  if (words.length === 0) return 1;
  const fields: readonly Field[] = [
    { words: `${kind.label} ${kind.name}`, weight: LABEL },
    { words: `${kind.offered.words} ${kind.offered.line}`, weight: SYNONYM },
    { words: kind.meaning, weight: SUMMARY },
  ];
  const body = withoutMarks(fillPlaces(kind.offered.body, ground));
  let sum = 0;
  let ofKind = false;
  for (const word of words) {
    const answered = answersWord(word, fields);
    const bound = isIn(word, body) ? BOUND : 0;
    if (answered === 0 && bound === 0) return 0;
    ofKind ||= answered > 0;
    sum += Math.max(answered, bound);
  }
  return ofKind ? sum : 0;
}

function isIn(word: string, body: string): boolean {
  return new RegExp(`(?<!\\w)${word.replace(/[^\w]/g, "\\$&")}(?!\\w)`).test(body);
}
