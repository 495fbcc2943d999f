import { type Range, RangeSet, RangeSetBuilder, type Text } from "@codemirror/state";
import { Decoration, type DecorationSet, type EditorView, ViewPlugin, type ViewUpdate } from "@codemirror/view";

/**
 * What is drawn over the text, in sets that the editor can compare quickly. At each change it walks through every set
 * that replaces something in the text, from the text's beginning to its end, and passes over what has stayed only in
 * sets that replace nothing. Hence what is replaced within a line, by far the most, is given for the lines in view alone
 * (`inView`); what replaces whole lines or a line break makes heights, and has to be known of the whole text.
 */
export interface Layers {
  /** Replaces within one line. */
  readonly inline: DecorationSet;
  /** Blocks, and what replaces line breaks. */
  readonly blocks: DecorationSet;
  /** Dress of words and of lines. */
  readonly marks: DecorationSet;
}

export const NO_LAYERS: Layers = { inline: Decoration.none, blocks: Decoration.none, marks: Decoration.none };

/** Puts each of some decorations of a text into its layer; in any order. */
export function inLayers(made: readonly Range<Decoration>[], doc: Text): Layers {
  const sorted: Record<keyof Layers, Range<Decoration>[]> = { inline: [], blocks: [], marks: [] };
  for (const each of made) sorted[layerOf(each, doc)].push(each);
  return {
    inline: RangeSet.of(sorted.inline, true),
    blocks: RangeSet.of(sorted.blocks, true),
    marks: RangeSet.of(sorted.marks, true),
  };
}

function layerOf({ from, to, value }: Range<Decoration>, doc: Text): keyof Layers {
  if (value.spec.block === true) return "blocks";
  if (!value.point || from === to) return "marks";
  return crosses(from, to, doc) ? "blocks" : "inline";
}

function crosses(from: number, to: number, doc: Text): boolean {
  return doc.lineAt(from).to < to;
}

/** Does the same to each layer. The very layers where none of them becomes another. */
export function eachLayer(layers: Layers, change: (set: DecorationSet, name: keyof Layers) => DecorationSet): Layers {
  const next = {
    inline: change(layers.inline, "inline"),
    blocks: change(layers.blocks, "blocks"),
    marks: change(layers.marks, "marks"),
  };
  const same = next.inline === layers.inline && next.blocks === layers.blocks && next.marks === layers.marks;
  return same ? layers : next;
}

/** The decorations of `inlineOf(view)` on the lines in view. */
export function inView(inlineOf: (view: EditorView) => DecorationSet) {
  return ViewPlugin.define((view) => new InView(view, inlineOf), { decorations: ({ decorations }) => decorations });
}

class InView {
  decorations: DecorationSet;
  private readonly inlineOf: (view: EditorView) => DecorationSet;
  private of: DecorationSet;

  constructor(view: EditorView, inlineOf: (view: EditorView) => DecorationSet) {
    this.inlineOf = inlineOf;
    this.of = inlineOf(view);
    this.decorations = within(this.of, view);
  }

  update({ view, docChanged, viewportChanged }: ViewUpdate): void {
    const of = this.inlineOf(view);
    if (of === this.of && !docChanged && !viewportChanged) return;
    this.of = of;
    this.decorations = within(of, view);
  }
}

function within(set: DecorationSet, { viewport, state: { doc } }: EditorView): DecorationSet {
  const builder = new RangeSetBuilder<Decoration>();
  for (const cursor = set.iter(viewport.from); cursor.value !== null && cursor.from <= viewport.to; cursor.next()) {
    // Somebody may have broken the line since: then the source shows until the worker's answer.
    if (!crosses(cursor.from, cursor.to, doc)) builder.add(cursor.from, cursor.to, cursor.value);
  }
  return builder.finish();
}
