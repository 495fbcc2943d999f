import { Annotation, type Extension, RangeSet, type Text } from "@codemirror/state";
import {
  Decoration,
  type DecorationSet,
  type EditorView,
  ViewPlugin,
  type ViewUpdate,
  WidgetType,
} from "@codemirror/view";
import type { Awareness } from "y-protocols/awareness";
import * as Y from "yjs";
import { element } from "./element.ts";

const moved = Annotation.define<true>();

/** At most one word of one's own caret in this time, in ms: it goes with every letter, and nobody reads that fast. */
const BETWEEN_MS = 80;

/** Where the others write: a proof caret below the line, and the name in the margin beside it. */
export function remoteCarets(text: Y.Text, awareness: Awareness): Extension {
  return ViewPlugin.define((view) => new RemoteCarets(view, text, awareness), {
    decorations: (carets) => carets.decorations,
  });
}

class RemoteCarets {
  decorations: DecorationSet = Decoration.none;
  private readonly text: Y.Text;
  private readonly awareness: Awareness;
  private telling: ReturnType<typeof setTimeout> | undefined;
  private redrawing: number | null = null;
  private toldAt = Number.NEGATIVE_INFINITY;
  private readonly heard: (change: { added: number[]; updated: number[]; removed: number[] }) => void;

  constructor(view: EditorView, text: Y.Text, awareness: Awareness) {
    this.text = text;
    this.awareness = awareness;
    this.heard = ({ added, updated, removed }) => {
      const others = [...added, ...updated, ...removed].some((client) => client !== awareness.clientID);
      if (others) this.redrawSoon(view);
    };
    awareness.on("change", this.heard);
  }

  update(update: ViewUpdate): void {
    if (update.docChanged || update.selectionSet || update.focusChanged) this.tellOwnSoon(update.view);
    const redraw = update.docChanged || update.transactions.some((each) => each.annotation(moved) === true);
    if (!redraw) return;
    this.decorations = this.draw(update.state.doc);
    // Drawn with the words that came with them.
    if (this.redrawing !== null) cancelAnimationFrame(this.redrawing);
    this.redrawing = null;
  }

  destroy(): void {
    this.awareness.off("change", this.heard);
    clearTimeout(this.telling);
    if (this.redrawing !== null) cancelAnimationFrame(this.redrawing);
  }

  /** Once before the next paint, however many carets have moved. */
  private redrawSoon(view: EditorView): void {
    if (this.redrawing !== null) return;
    this.redrawing = requestAnimationFrame(() => {
      this.redrawing = null;
      view.dispatch({ annotations: moved.of(true) });
    });
  }

  private tellOwnSoon(view: EditorView): void {
    if (this.telling !== undefined) return;
    const wait = Math.max(0, this.toldAt + BETWEEN_MS - Date.now());
    this.telling = setTimeout(() => {
      this.telling = undefined;
      this.toldAt = Date.now();
      this.tellOwn(view);
    }, wait);
  }

  private tellOwn(view: EditorView): void {
    const own = this.awareness.getLocalState();
    if (own === null) return;
    if (!view.hasFocus) {
      if (own.cursor !== undefined && own.cursor !== null) this.awareness.setLocalStateField("cursor", null);
      return;
    }
    const { anchor, head } = view.state.selection.main;
    const cursor = { anchor: this.relative(anchor), head: this.relative(head) };
    if (JSON.stringify(cursor) !== JSON.stringify(own.cursor)) this.awareness.setLocalStateField("cursor", cursor);
  }

  private relative(index: number): unknown {
    return Y.relativePositionToJSON(Y.createRelativePositionFromTypeIndex(this.text, index));
  }

  private draw(doc: Text): DecorationSet {
    const { length } = doc;
    const marks: ReturnType<Decoration["range"]>[] = [];
    for (const [client, state] of this.awareness.getStates()) {
      if (client === this.awareness.clientID) continue;
      const head = this.absolute(state.cursor?.head);
      const anchor = this.absolute(state.cursor?.anchor);
      if (head === null || anchor === null || head > length || anchor > length) continue;
      const name = typeof state.user?.name === "string" ? state.user.name : "";
      marks.push(Decoration.widget({ widget: new Caret(name), side: head > anchor ? -1 : 1 }).range(head));
      marks.push(WITH_CARET.range(doc.lineAt(head).from));
      if (head !== anchor) {
        const mark = Decoration.mark({ class: "hl-remote-selection" });
        marks.push(mark.range(Math.min(head, anchor), Math.max(head, anchor)));
      }
    }
    return marks.length === 0 ? RangeSet.empty : Decoration.set(marks, true);
  }

  private absolute(position: unknown): number | null {
    const { doc } = this.text;
    if (position === null || typeof position !== "object" || doc === null) return null;
    const place = Y.createAbsolutePositionFromRelativePosition(Y.createRelativePositionFromJSON(position), doc);
    return place !== null && place.type === this.text ? place.index : null;
  }
}

/** The name stands in the margin beside its line. */
const WITH_CARET = Decoration.line({ class: "hl-with-caret" });

class Caret extends WidgetType {
  private readonly name: string;
  constructor(name: string) {
    super();
    this.name = name;
  }
  override eq(other: Caret): boolean {
    return this.name === other.name;
  }
  override toDOM(): HTMLElement {
    return element("span", "hl-remote-caret", [element("span", "hl-remote-name", [this.name])], {
      "aria-hidden": "true",
    });
  }
  override ignoreEvent(): boolean {
    return true;
  }
}
