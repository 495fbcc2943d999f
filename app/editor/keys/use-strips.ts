import { useEffect, useMemo, useState, useSyncExternalStore } from "react";
import { useNavigate } from "react-router";
import type { Desk } from "../live/desk.ts";
import { createStore, type Store } from "../live/store.ts";
import type { StrandWatch } from "../strands/watch.ts";
import { readBinding } from "./binding.ts";
import { pressComposing, pressEscape, pressFind } from "./composing.ts";
import type { SheetAtHand, Strips } from "./types.ts";

interface Given {
  readonly desk: Desk | null;
  readonly strands: StrandWatch | null;
  readonly ready: boolean;
  readonly writes: boolean;
  readonly paperId: string;
  readonly personId: string | null;
}

/** The sheet as its commands find it, with the composing key at work; null until the text is here. */
export function useSheetAtHand({ desk, strands, ready, writes, paperId, personId }: Given): SheetAtHand | null {
  const navigate = useNavigate();
  const [strips] = useState<Store<Strips>>(() =>
    createStore<Strips>({ open: null, about: null, composing: false, binding: readBinding(personId) }),
  );
  const view = ready ? (desk?.view ?? null) : null;
  const sheet = useMemo<SheetAtHand | null>(
    () =>
      desk === null || view === null
        ? null
        : {
            desk,
            view,
            strands,
            strips,
            writes,
            paperId,
            signedIn: personId !== null,
            leaveFor: (address) => void navigate(address),
          },
    [desk, view, strands, strips, writes, paperId, personId, navigate],
  );
  useComposingKey(sheet);
  useRenaming(sheet);
  return sheet;
}

/** A command of the text that bears a name to be changed opens the strip for it. */
function useRenaming(sheet: SheetAtHand | null): void {
  useEffect(() => {
    if (sheet === null) return;
    const { dom } = sheet.view;
    const open = ({ target }: MouseEvent) => {
      const about =
        target instanceof Element ? target.closest<HTMLElement>("[data-rename]")?.dataset.rename : undefined;
      if (about !== undefined) sheet.strips.set({ open: "rename", about });
    };
    dom.addEventListener("click", open);
    return () => dom.removeEventListener("click", open);
  }, [sheet]);
}

function useComposingKey(sheet: SheetAtHand | null): void {
  useEffect(() => {
    if (sheet === null) return;
    // Before the text and its parts, so that a command's letter is not written.
    const first = (event: KeyboardEvent) => {
      if (!pressComposing(event, sheet) && !pressFind(event, sheet)) return;
      event.preventDefault();
      event.stopPropagation();
    };
    // After them: what is nearer closes first.
    const last = (event: KeyboardEvent) => {
      if (pressEscape(event, sheet)) event.preventDefault();
    };
    const leave = () => sheet.strips.set({ composing: false });
    window.addEventListener("keydown", first, true);
    window.addEventListener("keydown", last);
    window.addEventListener("pointerdown", leave);
    return () => {
      window.removeEventListener("keydown", first, true);
      window.removeEventListener("keydown", last);
      window.removeEventListener("pointerdown", leave);
    };
  }, [sheet]);
}

export function useStrips<T>(strips: Store<Strips>, choose: (strips: Strips) => T): T {
  return useSyncExternalStore(strips.watch, () => choose(strips.get()));
}
