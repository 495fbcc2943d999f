import type { EditorView } from "@codemirror/view";
import type { SheetAtHand } from "../keys/types.ts";
import { lay } from "./lay.ts";
import type { Offer } from "./types.ts";

/** Where the caret is; where nobody has put it yet, the end of the text. */
export function caretOf({ state }: EditorView): number {
  const { head } = state.selection.main;
  return head === 0 ? state.doc.length : head;
}

/** Sets what is offered at the caret, as one edit, with what one will change first chosen; and puts the case away. */
export function setOffer({ desk, view, strips }: SheetAtHand, offer: Offer): void {
  const { changes, select, line } = lay(view.state.doc.toString(), caretOf(view), offer.setting);
  desk.edit({
    changes,
    selection: { anchor: select.from, head: select.to },
    scrollIntoView: true,
    userEvent: "input.case",
  });
  strips.set({ open: null });
  view.focus();
  desk.tell(
    `${offer.title} is set at line ${line}${select.from < select.to ? "; what to change first is chosen" : ""}.`,
  );
}
