import { renderMath } from "../../ui/math.ts";
import { BOUND_CLASSES, withoutClasses } from "../model/bound-classes.ts";
import type { Content, FrontFace, NumberFace, Run } from "../model/types.ts";
import { noteQuotes } from "../strands/quoted.ts";
import { element } from "./element.ts";

type Macros = Readonly<Record<string, string>>;
type Setter<C extends Content> = (content: C, macros: Macros) => HTMLElement;
type Setters = { readonly [Name in Content["content"]]: Setter<Extract<Content, { content: Name }>> };

/** How each content is set; a new content is one line here. */
const SETTERS: Setters = {
  math: (content, macros) => math(content.tex, false, macros, content.numbers),
  display: (content, macros) => {
    const number = content.number === "" ? [] : [element("span", "hl-display-number", [`(${content.number})`])];
    return element("div", "hl-display", [math(content.tex, true, macros, content.numbers), ...number]);
  },
  number: (content) => number(content.number),
  pointer: ({ text, amiss }) => element("span", amiss ? "hl-pointer hl-amiss" : "hl-pointer", [text]),
  words: (content, macros) => element("span", content.dress, [runs(content.runs, macros)]),
  grid: (content, macros) => grid(content.head, content.rows, content.align, macros),
  image: (content) => element("div", "hl-image", [element("span", "hl-image-name", [content.name]), content.caption]),
  title: (content, macros) => title(content.front, macros),
};

/** Sets a content as an element. Never throws: what cannot be set says so in its place. */
export function setContent(content: Content, macros: Macros): HTMLElement {
  try {
    // The table's type says that each setter takes the content of its own name; indexing by a union loses it.
    return (SETTERS[content.content] as Setter<Content>)(content, macros);
  } catch (error) {
    return element("span", "hl-amiss", [`cannot be set: ${error instanceof Error ? error.message : String(error)}`]);
  }
}

/** Sets running text. */
export function runs(given: readonly Run[], macros: Macros): DocumentFragment {
  const made = document.createDocumentFragment();
  for (const each of given) made.append(run(each, macros));
  return made;
}

function run(given: Run, macros: Macros): Node {
  switch (given.run) {
    case "text":
      return document.createTextNode(given.text);
    case "math":
      return math(given.tex, false, macros, given.numbers);
    case "number":
      return number(given.number);
    case "code":
      return element("code", "hl-code", [given.text]);
    case "emphasis":
      return element("em", "", [runs(given.runs, macros)]);
    case "strong":
      return element("strong", "", [runs(given.runs, macros)]);
    case "deleted":
      return element("del", "", [runs(given.runs, macros)]);
    case "link":
      return element("a", "hl-link", [runs(given.runs, macros)], { href: given.url, rel: "noreferrer" });
  }
}

function math(tex: string, display: boolean, macros: Macros, numbers: readonly NumberFace[] = []): HTMLElement {
  const made = element("span", display ? "hl-math hl-math-display" : "hl-math");
  const set = numbers.length === 0 ? renderMath : renderBound;
  made.innerHTML = set(display ? withClauses(tex) : tex, display, macros);
  if (display) holdClauses(made);
  noteQuotes(made, numbers);
  return made;
}

/** The wide spaces of a display part its clauses: after them it may break. */
function withClauses(tex: string): string {
  return tex.replace(/\\q?quad(?![A-Za-z])/g, "$&\\allowbreak ");
}

/** A display breaks between its clauses first, and within one only where that by itself is wider than the column. */
function holdClauses(display: HTMLElement): void {
  for (const html of display.querySelectorAll(".katex-html")) {
    const bases = [...html.children].filter((child) => child.classList.contains("base"));
    if (!bases.some((base) => base.querySelector(":scope > .allowbreak") !== null)) continue;
    let clause: HTMLElement | null = null;
    for (const base of bases) {
      if (clause === null) {
        clause = element("span", "hl-clause");
        base.before(clause);
      }
      clause.append(base);
      if (base.querySelector(":scope > .allowbreak") !== null) clause = null;
    }
  }
}

/** A formula with bound numbers in it, each with its underline. A macro of the paper's own must not give classes either. */
function renderBound(tex: string, display: boolean, macros: Macros): string {
  const sound = Object.entries(macros).map(([name, body]) => [name, withoutClasses(body)]);
  return renderMath(tex, display, Object.fromEntries(sound), BOUND_CLASSES);
}

const MARKS: Readonly<Record<NumberFace["state"], string>> = {
  current: "",
  outOfDate: "†",
  stands: "†",
  computing: "",
  waiting: "",
  failed: "‡",
  empty: "",
  preview: "",
};
const AFTER: Readonly<Record<NumberFace["state"], string>> = {
  current: "",
  outOfDate: "",
  stands: "",
  computing: " being set",
  waiting: " waits",
  failed: "",
  empty: "",
  preview: "",
};

/** What stands where there is no value at all. */
const VALUELESS: Readonly<Record<NumberFace["state"], string>> = {
  current: "no value",
  outOfDate: "no value",
  stands: "no value",
  computing: "",
  waiting: "",
  failed: "no value",
  empty: "no value yet",
  preview: "no value",
};

/** A number that is bound to a result: supported digits in ink, the rest grey, its state as a mark. */
function number(face: NumberFace): HTMLElement {
  const valueless = face.known === "" && face.rest === "";
  const digits = valueless
    ? [VALUELESS[face.state]]
    : [face.known, ...(face.unknown === "" ? [] : [element("span", "hl-unknown", [face.unknown])]), face.rest];
  const made = element("span", `hl-number hl-number-${face.state}${valueless ? " hl-valueless" : ""}`, digits);
  const [first, second] = [face.strands[0], face.strands[1] ?? face.strands[0]];
  if (first !== undefined) made.style.setProperty("--a", strandColour(first));
  if (second !== undefined) made.style.setProperty("--b", strandColour(second));
  noteQuotes(made, [face]);
  const mark = MARKS[face.state];
  const after = AFTER[face.state];
  return element("span", "hl-number-place", [
    made,
    ...(mark === "" ? [] : [element("span", "hl-dagger", [mark], { "aria-hidden": "true" })]),
    ...(after === "" ? [] : [element("i", "hl-number-after", [after])]),
    element("span", "hl-said", [`, ${face.said}`]),
  ]);
}

/** The colour of the strand of the parameter declared at `place` (from 0); from the seventh on they repeat. */
export function strandColour(place: number): string {
  return `var(--strand-${(place % 6) + 1})`;
}

function grid(
  head: readonly (readonly Run[])[],
  rows: readonly (readonly Run[])[][],
  align: readonly (string | null)[],
  macros: Macros,
): HTMLElement {
  const cell = (tag: "th" | "td") => (content: readonly Run[], column: number) =>
    element(tag, "", [runs(content, macros)], { style: `text-align:${align[column] ?? "left"}` });
  return element("div", "paper-grid", [
    element("table", "paper-table", [
      element("thead", "", [element("tr", "", head.map(cell("th")))]),
      element(
        "tbody",
        "",
        rows.map((row) => element("tr", "", row.map(cell("td")))),
      ),
    ]),
  ]);
}

function title(front: FrontFace, macros: Macros): HTMLElement {
  const authors = front.authors.map((author) =>
    element("span", "hl-author", [
      author.name,
      ...(author.affiliation === "" ? [] : [element("span", "hl-affiliation", [author.affiliation])]),
    ]),
  );
  return element("div", "hl-title-block", [
    element("h1", "hl-title", [runs(front.title, macros)]),
    ...(authors.length === 0 ? [] : [element("div", "hl-authors", authors)]),
    ...(front.abstract.length === 0 ? [] : [element("div", "hl-abstract", [runs(front.abstract, macros)])]),
  ]);
}
