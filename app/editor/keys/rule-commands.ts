import { heldParameter } from "../rule/handles.ts";
import { ruleEditing } from "../rule/rule-editing.ts";
import type { SheetAtHand, SheetCommand } from "./types.ts";

/** Commands about the parameters on the rule. */
export const RULE_COMMANDS: readonly SheetCommand[] = [
  {
    id: "rule",
    group: "Cells",
    words: "Go to the parameter rule",
    letter: "p",
    unavailable: noRule,
    act: () => firstHandle()?.focus(),
  },
  {
    id: "change-parameter",
    group: "Cells",
    words: "Change a parameter: value, unit, note, scale",
    letter: "P",
    writing: true,
    unavailable: noRule,
    act: (sheet) => {
      const name = heldParameter() ?? firstHandle()?.dataset.parameter;
      if (name !== undefined) ruleEditing(sheet)?.change(name);
    },
  },
  {
    id: "add-parameter",
    group: "Cells",
    words: "Add a parameter",
    letter: "+",
    writing: true,
    unavailable: notRead,
    act: (sheet) => ruleEditing(sheet)?.add(),
  },
];

function firstHandle(): HTMLElement | null {
  return document.querySelector<HTMLElement>(".hl-rule [role=spinbutton]");
}

function noRule(): string {
  return firstHandle() === null ? "This paper has no parameters yet." : "";
}

function notRead({ desk }: SheetAtHand): string {
  return desk.store.get().model === null ? "The paper is still being read." : "";
}
