import { type EditorView, WidgetType } from "@codemirror/view";
import { noteQuotes } from "../strands/quoted.ts";
import { element } from "../text/element.ts";
import { turnFold } from "./fold-effects.ts";
import type { Held } from "./sections.ts";

/** Stands for what is folded: says what it holds. What hangs from the parameters in it hangs from this line. */
export class FoldLine extends WidgetType {
  private readonly words: string;
  private readonly held: Held;
  constructor(words: string, held: Held) {
    super();
    this.words = words;
    this.held = held;
  }
  override eq(other: FoldLine): boolean {
    return this.words === other.words && signOf(this.held) === signOf(other.held);
  }
  override get estimatedHeight(): number {
    return 28;
  }
  override toDOM(view: EditorView): HTMLElement {
    const made = element("div", "hl-fold", [
      element("span", "hl-fold-words", [this.words]),
      " ",
      command(view, "", true),
    ]);
    made.dataset.slots = this.held.slots.join(" ");
    noteQuotes(made, this.held.numbers);
    return made;
  }
  override ignoreEvent(): boolean {
    return true;
  }
}

function signOf({ slots, numbers }: Held): string {
  return JSON.stringify([slots, numbers]);
}

/** The word at a heading that folds its section: seen when the heading is pointed at, has the caret, or by the keys. */
export class FoldWord extends WidgetType {
  private readonly number: string;
  private readonly folded: boolean;
  constructor(number: string, folded: boolean) {
    super();
    this.number = number;
    this.folded = folded;
  }
  override eq(other: FoldWord): boolean {
    return this.number === other.number && this.folded === other.folded;
  }
  override toDOM(view: EditorView): HTMLElement {
    const made = element("span", "hl-fold-word", [command(view, this.number, this.folded)]);
    if (this.folded) made.hidden = true;
    return made;
  }
  override ignoreEvent(): boolean {
    return true;
  }
}

function command(view: EditorView, number: string, folded: boolean): HTMLElement {
  const word = folded ? "Unfold" : "Fold";
  const made = element("button", "command hl-small hl-quiet", [word], {
    type: "button",
    "aria-label": number === "" ? `${word} the section` : `${word}, Section ${number}`,
    "aria-expanded": String(!folded),
  });
  made.addEventListener("mousedown", (event) => event.preventDefault());
  made.addEventListener("click", ({ detail }) => {
    // A fold's own line stands beneath its heading's.
    const at = folded ? Math.max(0, view.posAtDOM(made) - 1) : view.posAtDOM(made);
    view.dispatch(turnFold(view.state, at, !folded));
    if (detail === 0) giveKeys(view, at);
  });
  return made;
}

/** By the keys one stays at the word: it says the other thing now. */
function giveKeys(view: EditorView, at: number): void {
  const line = view.state.doc.lineAt(at);
  const commands = [
    ...view.contentDOM.querySelectorAll<HTMLElement>(".hl-fold button, .hl-fold-word:not([hidden]) button"),
  ];
  commands.find((each) => [line.to, line.to + 1].includes(view.posAtDOM(each)))?.focus();
}
