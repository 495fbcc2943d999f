import type { CellWords, KeyWord, Knowledge, Word } from "../model/knowledge.ts";
import { dummiesAt } from "./dummies.ts";
import { type CellAround, cellAround, placeAt, type WritingPlace } from "./place.ts";
import { TEX_ENVIRONMENTS, TEX_WORDS } from "./tex-words.ts";

/** What may be written. */
export interface Suggestion {
  /** As it is listed, and matched with what is written. */
  readonly label: string;
  readonly meaning: string;
  /** What is put in for it. */
  readonly insert: string;
  /** How many characters before the end of it the caret comes to stand. */
  readonly back: number;
}

export interface Suggestions {
  /** Where the word begins that a suggestion takes the place of. */
  readonly from: number;
  readonly list: readonly Suggestion[];
  /** To be shown before a letter is written: something is wanted here. */
  readonly eager: boolean;
}

type Found = Omit<Suggestions, "eager">;

/**
 * What may stand at a place of a paper's text, in a good order; null where it is plain prose. Nothing is matched yet
 * with the word that is begun there.
 */
export function suggestionsAt(text: string, offset: number, knowledge: Knowledge): Suggestions | null {
  const place = placeAt(text, offset);
  if (place === null) return null;
  const found = suggestionsIn(place, knowledge, () => dummiesAt(text, offset, cellAround(text, offset), knowledge));
  if (found === null || found.list.length === 0) return null;
  return { ...found, eager: EAGER.has(place.place) || text[found.from - 1] === "." };
}

/** Where nothing but a word of the list may stand. */
const EAGER: ReadonlySet<WritingPlace["place"]> = new Set<WritingPlace["place"]>([
  "environment",
  "label",
  "citation",
  "tex",
  "texEnvironment",
]);

/** Names of the place's own; null where one is being given just there. */
type Dummies = () => readonly Word[] | null;

function suggestionsIn(place: WritingPlace, knowledge: Knowledge, dummies: Dummies): Found | null {
  const { words, names } = knowledge;
  const { from } = place;
  switch (place.place) {
    case "kind":
      return { from, list: words.kinds.map((kind) => plain(kind.name, kind.meaning, `${kind.name} `)) };
    case "key":
      return { from, list: keysAt(place, knowledge).map(keySuggestion) };
    case "value":
      return valuesAt(place, knowledge, dummies);
    case "formula":
      return inFormula(place.written, from, knowledge, dummies);
    case "attributes":
      return { from, list: place.of === "cite" ? CITATION_ATTRIBUTES : words.numberAttributes.map(attribute) };
    case "environment":
      return { from, list: words.environments.map(({ name, meaning }) => plain(name, meaning)) };
    case "label":
      return {
        from,
        list: names.labels.map(({ label, text, about }) => plain(label, about === "" ? text : `${text}: ${about}`)),
      };
    case "citation":
      return { from, list: names.citations.map(({ name, meaning }) => plain(name, meaning)) };
    case "directive":
      return { from, list: DIRECTIVES };
    case "tex":
      return { from, list: TEX_WORDS };
    case "texEnvironment":
      return { from, list: TEX_ENVIRONMENTS.map(({ name, meaning }) => plain(name, meaning)) };
  }
}

function plain(label: string, meaning: string, insert = label, back = 0): Suggestion {
  return { label, meaning, insert, back };
}

const DIRECTIVES: readonly Suggestion[] = [
  plain("value", "a number bound to a result: :value[K.mean]{digits=6}", "value[]", 1),
  plain("ref", "a reference to a label or to a cell's figure or table", "ref[]", 1),
  plain("cite", "a citation of an entry of the bibliography", "cite[]", 1),
];

const CITATION_ATTRIBUTES: readonly Suggestion[] = [
  plain("at", 'where in the work: at="Theorem 1.2"', 'at=""', 1),
  plain("as=text", "the name within the sentence: Kesten (1978)"),
];

function attribute({ form, meaning }: { form: string; meaning: string }): Suggestion {
  return plain(form, meaning);
}

/** Keys that may stand at a place: of the kind, of a parameter's map, of axes. */
export function keysAt(
  { cell, under, taken }: { cell: CellAround; under: string | null; taken: readonly string[] },
  { words }: Knowledge,
): readonly KeyWord[] {
  const kind = words.kinds.find(({ name }) => name === cell.kind);
  if (kind === undefined) return [];
  const free = (keys: readonly KeyWord[]) => keys.filter(({ name }) => !taken.includes(name));
  const isFigure = kind.parts.includes("figure");
  const presentation = words.presentation.filter(({ figuresOnly }) => isFigure || !figuresOnly);
  if (under === null) return free(kind.ownKeys ? [] : [...kind.keys, ...presentation]);
  if (kind.ownKeys) return free(kind.keys);
  if (isFigure) return free(INNER_KEYS[under] ?? []);
  return free(under === "offspring" ? OFFSPRING_KEYS : []);
}

function inner(name: string, meaning: string): KeyWord {
  return { name, meaning, required: false, fallback: null };
}

const INNER_KEYS: Readonly<Record<string, readonly KeyWord[]>> = {
  axes: [
    inner("x", "range of the horizontal axis: 0 to 4"),
    inner("y", "range of the vertical axis: 0 to 1"),
    inner("log", "which axes are logarithmic: y, or [x, y]"),
    inner("linear", "which axes are not logarithmic, where the kind has them so"),
  ],
  labels: [inner("x", "TeX at the end of the horizontal axis"), inner("y", "TeX at the end of the vertical axis")],
};

const OFFSPRING_KEYS = [inner("law", "geometric or poisson"), inner("mean", "mean number of children")];

function keySuggestion({ name, meaning, required, fallback }: KeyWord): Suggestion {
  return plain(name, `${meaning}${remarkOn(required, fallback)}`, `${name}: `);
}

/** "; required", "; otherwise 1/2" */
export function remarkOn(required: boolean, fallback: string | null): string {
  if (required) return "; required";
  return fallback === null ? "" : `; otherwise ${fallback}`;
}

/** Values that are words, by the key that takes them. */
const WORDS_OF: Readonly<Record<string, readonly Word[]>> = {
  offspring: [
    { name: "binary", meaning: "two children" },
    { name: "ternary", meaning: "three children" },
    { name: "{law: geometric, mean: 2}", meaning: "geometric on 0, 1, 2, …" },
    { name: "{law: poisson, mean: 2}", meaning: "Poisson on 0, 1, 2, …" },
  ],
  law: [
    { name: "geometric", meaning: "geometric on 0, 1, 2, …" },
    { name: "poisson", meaning: "Poisson on 0, 1, 2, …" },
  ],
  scale: [
    { name: "linear", meaning: "points evenly" },
    { name: "log", meaning: "points evenly in the logarithm" },
    { name: "adapted", meaning: "points where what is recorded bends" },
  ],
  log: [
    { name: "x", meaning: "the horizontal axis" },
    { name: "y", meaning: "the vertical axis" },
  ],
  as: [
    { name: "plain", meaning: "all digits in line" },
    { name: "scientific", meaning: "with a power of ten" },
    { name: "percent", meaning: "in hundredths" },
  ],
};

/** Keys whose values are prose. */
const PROSE: ReadonlySet<string> = new Set(["caption", "because", "note", "unit", "head", "file"]);
const TEX: ReadonlySet<string> = new Set(["symbol"]);

function valuesAt(
  place: Extract<WritingPlace, { place: "value" }>,
  knowledge: Knowledge,
  dummies: Dummies,
): Found | null {
  const { key, under, written, cell } = place;
  if (PROSE.has(key)) return null;
  if (TEX.has(key) || under === "labels") return texIn(written, place.from);
  const word = /[\w]*$/.exec(written)?.[0] ?? "";
  const from = place.from + written.length - word.length;
  if (key === "show") {
    const parts = knowledge.words.kinds.find(({ name }) => name === cell.kind)?.parts ?? [];
    const list = parts.map((part) => plain(part, PARTS[part] ?? "a part of it"));
    return { from, list: [...list, plain("none", "prints nothing")] };
  }
  const listed = WORDS_OF[key];
  if (listed !== undefined) {
    const whole = written.trim() === word;
    return whole ? { from, list: listed.map(({ name, meaning }) => plain(name, meaning)) } : null;
  }
  if (key === "of") return { from, list: cellsFor(cell, knowledge).map(({ name, title }) => plain(name, title)) };
  return inFormula(written, place.from, knowledge, dummies);
}

const PARTS: Readonly<Record<string, string>> = {
  figure: "its figure",
  table: "its table",
  points: "the table of the plotted points",
};

/** The cells that `of` may name: processes, or for what is computed of a system, systems. */
function cellsFor({ kind, name }: CellAround, { names }: Knowledge): readonly CellWords[] {
  const wanted = kind === "stability" || kind === "pattern" ? "system" : "process";
  return names.cells.filter((cell) => cell.kind === wanted && cell.name !== name);
}

function texIn(written: string, from: number): Found | null {
  const word = /\\[a-zA-Z]*$/.exec(written);
  return word === null ? null : { from: from + word.index, list: TEX_WORDS };
}

/** Names, functions and members, by the word before the caret. */
function inFormula(written: string, from: number, { words, names }: Knowledge, dummies: Dummies): Found | null {
  const member = /(?<![\w.])([A-Za-z]\w*)\.(\w*)$/.exec(written);
  if (member !== null) {
    const cell = names.cells.find(({ name }) => name === member[1]);
    if (cell === undefined) return null;
    const start = from + written.length - (member[2] ?? "").length;
    const values = cell.values.map(({ name, meaning }) => plain(name, meaning));
    const callables = cell.callables
      .filter((each) => each.member !== "")
      .map((each) => plain(each.member, `${each.form}: ${each.meaning}`, `${each.member}()`, 1));
    return { from: start, list: [...values, ...callables] };
  }
  const word = /(?<![\w.])[A-Za-z]\w*$/.exec(written)?.[0] ?? "";
  // A number, a finished word or a bracket stands before the caret: nothing begins there.
  if (word === "" && /[\w.)\]}]\s*$/.test(written)) return null;
  const own = dummies();
  if (own === null) return null;
  const start = from + written.length - word.length;
  const cells = names.cells.map((cell) => {
    const own = cell.callables.find((each) => each.member === "");
    return plain(cell.name, own === undefined ? cell.title : `${cell.title}; ${own.form}: ${own.meaning}`);
  });
  const functions = words.functions.map(({ name, form, meaning }) =>
    plain(name, `${form}: ${meaning}`, `${name}()`, 1),
  );
  return {
    from: start,
    list: [
      ...own.map(({ name, meaning }) => plain(name, meaning)),
      ...names.parameters.map(({ name, meaning }) => plain(name, meaning)),
      ...cells,
      ...functions,
      plain("pi", "3.14159…"),
      plain("e", "2.71828…"),
    ],
  };
}
