import { type EditorView, WidgetType } from "@codemirror/view";
import type { Content } from "../model/types.ts";
import { setContent } from "./contents.ts";
import { sheetHost } from "./host.ts";

/** Guesses for what is out of sight, in px; measured once it is drawn. */
const HEIGHTS: Readonly<Partial<Record<Content["content"], number>>> = {
  display: 56,
  title: 220,
  grid: 160,
  image: 80,
};

/** A content typeset in the text. Equal signs draw the same. */
export class ContentWidget extends WidgetType {
  readonly content: Content;
  readonly block: boolean;
  readonly sign: string;

  constructor(content: Content, block: boolean, sign: string) {
    super();
    this.content = content;
    this.block = block;
    this.sign = sign;
  }

  override eq(other: ContentWidget): boolean {
    return this.sign === other.sign && this.block === other.block;
  }

  override get estimatedHeight(): number {
    return this.block ? (HEIGHTS[this.content.content] ?? 28) : -1;
  }

  override toDOM(view: EditorView): HTMLElement {
    const made = setContent(this.content, view.state.facet(sheetHost)?.macros ?? {});
    made.classList.add("hl-set");
    return made;
  }

  /** The caret goes to the source when it is clicked. */
  override ignoreEvent(): boolean {
    return false;
  }
}

/** The space that a line break within a paragraph is set as. */
class SpaceWidget extends WidgetType {
  override eq(): boolean {
    return true;
  }
  override toDOM(): HTMLElement {
    const made = document.createElement("span");
    made.textContent = " ";
    return made;
  }
  override ignoreEvent(): boolean {
    return false;
  }
}

export const SPACE = new SpaceWidget();

/**
 * Keeps the widgets of one answer for the next: the same content is then the same object, and comparing
 * thousands of formulas on a keystroke costs nothing.
 */
export class WidgetStore {
  private before = new Map<string, ContentWidget>();
  private now = new Map<string, ContentWidget>();
  private macros = "";

  /**
   * Begins an answer; what neither it nor the one before uses is forgotten.
   * @returns false when the macros are others, so that nothing drawn before is good any more
   */
  begin(macros: Readonly<Record<string, string>>): boolean {
    const sign = JSON.stringify(macros);
    const same = sign === this.macros;
    this.before = same ? this.now : new Map();
    this.macros = sign;
    this.now = new Map();
    return same;
  }

  widget(content: Content, block: boolean): ContentWidget {
    const sign = `${block ? "b" : "i"}${signOf(content)}${this.macros}`;
    const made = this.now.get(sign) ?? this.before.get(sign) ?? new ContentWidget(content, block, sign);
    this.now.set(sign, made);
    return made;
  }
}

function signOf(content: Content): string {
  return content.content === "math" && content.numbers === undefined ? `m${content.tex}` : JSON.stringify(content);
}
