import { useState } from "react";
import { Command } from "../../ui/index.ts";
import { bindingOf, bindingWords, FIRST_BINDING, isHeld, keepBinding } from "./binding.ts";
import { COMMAND_GROUPS, commandsFor, give } from "./commands.ts";
import type { SheetAtHand, SheetCommand } from "./types.ts";
import { useStrips } from "./use-strips.ts";

interface Props {
  readonly sheet: SheetAtHand;
  readonly personId: string | null;
}

/** All commands of the sheet with their letters: the menu, and the list that `?` shows. */
export function CommandList({ sheet, personId }: Props) {
  const commands = commandsFor(sheet.writes);
  const binding = useStrips(sheet.strips, (strips) => strips.binding);
  return (
    <>
      <p className="hl-strip-words">
        <kbd>{bindingWords(binding)}</kbd>, then a letter; <kbd>Esc</kbd> leaves it.{" "}
        <Rebinding sheet={sheet} personId={personId} />
      </p>
      <div className="hl-command-groups">
        {COMMAND_GROUPS.map((group) => (
          <div key={group}>
            <h3>{group}</h3>
            <ul>
              {commands
                .filter((command) => command.group === group && command.id !== "commands")
                .map((command) => (
                  <CommandEntry key={command.id} command={command} sheet={sheet} />
                ))}
            </ul>
          </div>
        ))}
      </div>
      <p className="hl-strip-words hl-rule-keys">
        On the rule: <kbd>←</kbd> <kbd>→</kbd> one tick, with <kbd>Alt</kbd> a tenth, with <kbd>Ctrl</kbd> ten; digits
        type a value or a formula, <kbd>Enter</kbd> sets it, <kbd>Esc</kbd> puts back
        {sheet.writes ? (
          <>
            ; <kbd>Alt</kbd> <kbd>Shift</kbd> <kbd>←</kbd> <kbd>→</kbd> let the parameter stand earlier or later
          </>
        ) : null}
        .
      </p>
    </>
  );
}

function CommandEntry({ command, sheet }: { readonly command: SheetCommand; readonly sheet: SheetAtHand }) {
  // What has the keys says which cell is meant, and that is not the list: the list is put away first.
  const press = () => {
    sheet.strips.set({ open: null });
    requestAnimationFrame(() => give(command, sheet));
  };
  return (
    <li>
      <kbd className="hl-letter">{command.letter ?? ""}</kbd>
      <Command onClick={press} aria-keyshortcuts={command.letter ?? undefined}>
        {command.words}
      </Command>
    </li>
  );
}

/** Another composing key, chosen by pressing it. */
function Rebinding({ sheet, personId }: Props) {
  const [asking, setAsking] = useState(false);
  const [refused, setRefused] = useState("");
  const take = (binding: typeof FIRST_BINDING) => {
    keepBinding(personId, binding);
    sheet.strips.set({ binding });
    setAsking(false);
    setRefused("");
    sheet.desk.say(`The composing key is ${bindingWords(binding)}.`);
  };
  const press = (event: React.KeyboardEvent) => {
    if (!asking || isHeld(event) || event.key === "Tab") return;
    event.preventDefault();
    event.stopPropagation();
    if (event.key === "Escape") {
      setAsking(false);
      setRefused("");
      return;
    }
    const binding = bindingOf(event);
    if ("refused" in binding) setRefused(binding.refused);
    else take(binding);
  };
  return (
    <>
      <Command onClick={() => setAsking(true)} onKeyDown={press} onBlur={() => setAsking(false)}>
        {asking ? "Press the new key" : "Another key"}
      </Command>{" "}
      <Command onClick={() => take(FIRST_BINDING)}>Back to {bindingWords(FIRST_BINDING)}</Command>
      <span role="status">{refused === "" ? "" : ` ${refused}`}</span>
    </>
  );
}
