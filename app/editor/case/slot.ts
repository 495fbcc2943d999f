import { StateEffect, StateField } from "@codemirror/state";
import { Decoration, type DecorationSet, EditorView, WidgetType } from "@codemirror/view";
import { useEffect } from "react";
import { element } from "../text/element.ts";
import { gapAfter } from "./gap.ts";
import { caretOf } from "./set-offer.ts";
import type { Offer } from "./types.ts";

const setSlot = StateEffect.define<{ readonly at: number; readonly words: string } | null>();

/** A line across the column where something will stand. It takes no room, so that nothing moves. */
class SlotWidget extends WidgetType {
  readonly words: string;

  constructor(words: string) {
    super();
    this.words = words;
  }

  override eq(other: SlotWidget): boolean {
    return other.words === this.words;
  }

  override toDOM(): HTMLElement {
    const slot = element("div", "hl-case-slot");
    slot.setAttribute("aria-hidden", "true");
    slot.append(Object.assign(document.createElement("span"), { textContent: this.words }));
    return slot;
  }

  override get estimatedHeight(): number {
    return 0;
  }
}

const slotField = StateField.define<DecorationSet>({
  create: () => Decoration.none,
  update(before, transaction) {
    let slot = before.map(transaction.changes);
    for (const effect of transaction.effects) {
      if (!effect.is(setSlot)) continue;
      const { value } = effect;
      slot =
        value === null
          ? Decoration.none
          : Decoration.set(
              Decoration.widget({ widget: new SlotWidget(value.words), block: true, side: -1 }).range(value.at),
            );
    }
    return slot;
  },
  provide: (field) => EditorView.decorations.from(field),
});

/** Shows on the sheet where a block that is chosen in the case will stand, while the case is open. */
export function useSlot(view: EditorView, active: Offer | null): void {
  const setting = active?.setting.set === "block" ? active.setting : null;
  const title = setting === null ? "" : (active?.title ?? "");
  const outermost = setting?.outermost ?? false;
  useEffect(() => {
    if (view.state.field(slotField, false) === undefined) {
      view.dispatch({ effects: StateEffect.appendConfig.of(slotField) });
    }
    if (title === "") return;
    const text = view.state.doc.toString();
    const at = view.state.doc.lineAt(gapAfter(text, caretOf(view), outermost).from).from;
    const slot = { at, words: `${title} will stand here` };
    view.dispatch({ effects: [setSlot.of(slot), EditorView.scrollIntoView(at, { y: "start", yMargin: ABOVE_PX })] });
    return () => view.dispatch({ effects: setSlot.of(null) });
  }, [view, title, outermost]);
}

/** So much of what stands above stays in sight [px]. */
const ABOVE_PX = 220;
