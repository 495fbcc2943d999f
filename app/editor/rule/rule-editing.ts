import type { SheetAtHand } from "../keys/types.ts";

/** What may be asked of the rule beside values. */
export interface RuleEditing {
  /** Opens the entry of a parameter. */
  change(name: string): void;
  /** Opens the entry of a new one. */
  add(): void;
  /** Lets a parameter stand one place earlier or later. */
  move(name: string, by: -1 | 1): void;
}

/** For one who writes; null for one who only reads. */
export function ruleEditing(sheet: SheetAtHand | null): RuleEditing | null {
  if (sheet === null || !sheet.writes) return null;
  return {
    change: (name) => sheet.strips.set({ open: "parameter", about: name }),
    add: () => sheet.strips.set({ open: "parameter", about: null }),
    move: (name, by) => {
      void import("./reading-rule.ts").then(({ moveOnRule }) => moveOnRule(sheet, name, by));
    },
  };
}

/**
 * Why a parameter cannot have a value; "" when it can. Formulas are read by what is fetched on use; where it cannot be
 * had, without a connection, the text itself will say what is wrong.
 */
export async function typedFault(sheet: SheetAtHand, name: string, source: string): Promise<string> {
  try {
    const { valueFault } = await import("./reading-rule.ts");
    return valueFault(sheet, name, source);
  } catch {
    return "";
  }
}
