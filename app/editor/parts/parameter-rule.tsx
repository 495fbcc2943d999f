import { type ReactNode, useCallback, useEffect, useState } from "react";
import { Command } from "../../ui/index.ts";
import type { BorderFace, Borders } from "../model/borders.ts";
import type { ParameterFace } from "../model/types.ts";
import type { RuleEditing } from "../rule/rule-editing.ts";
import { ParameterIndex } from "./parameter-index.tsx";
import type { RuleWord } from "./rule-word.ts";
import { Runs } from "./runs.tsx";

interface Props {
  readonly parameters: readonly ParameterFace[];
  /** Where along each parameter cells answer otherwise. */
  readonly borders: Borders;
  /** Shows privately what follows of a value; null ends it. Nothing is kept. */
  onTry(name: string, source: string | null): void;
  /** Lets a value stand: one edit of the text, or of the private trial of one who only reads. */
  onSet(name: string, source: string): void;
  /** Why a parameter cannot have a value; "" when it can. */
  onJudge(name: string, source: string): Promise<string>;
  /** What else may be changed; null: for one who only reads. */
  readonly editing: RuleEditing | null;
  /** The entry that is open beneath the rule. */
  readonly children?: ReactNode;
  /** To be said to those who listen to the page; the same function at each drawing. */
  readonly onSay: (words: string) => void;
}

const NO_BORDERS: readonly BorderFace[] = [];
const NO_MACROS = {};

/**
 * The parameters of the paper at its head, each with its scale. It stays at the top while the sheet scrolls, and
 * scrolls sideways where it is too wide. A line beneath it tells what the borders on a scale mean, while the scale is
 * pointed at, has the keys, or is moved across one. Without parameters there is no rule, only room for an entry.
 */
export function ParameterRule({ parameters, borders, onTry, onSet, onJudge, editing, children, onSay }: Props) {
  const scrolled = useSidewaysRegion(parameters.length);
  const [said, setSaid] = useState<readonly { readonly name: string; readonly word: RuleWord }[]>([]);
  const tell = useCallback((name: string, word: RuleWord | null) => {
    setSaid((before) => {
      if (word === null && !before.some((each) => each.name === name)) return before;
      const others = before.filter((each) => each.name !== name);
      return word === null ? others : [...others, { name, word }];
    });
  }, []);
  // The newest; when it ends, what was said before of another parameter stands again.
  const word = said.at(-1)?.word ?? null;
  if (parameters.length === 0) return <div className="hl-rule-place hl-rule-none">{children}</div>;
  return (
    <div className="hl-rule-place">
      <section className="hl-rule" aria-label="Parameters" ref={scrolled}>
        <div className="hl-rule-row">
          {parameters.map((parameter, place) => (
            <ParameterIndex
              key={parameter.name}
              parameter={parameter}
              borders={borders[parameter.name] ?? NO_BORDERS}
              place={place}
              onTry={onTry}
              onSet={onSet}
              onJudge={onJudge}
              editing={editing}
              onSay={onSay}
              onWord={tell}
            />
          ))}
          {editing === null ? null : (
            <div className="hl-par-add">
              <Command onClick={editing.add} aria-label="Add a parameter">
                Add
              </Command>
            </div>
          )}
        </div>
      </section>
      {children}
      {/* The same is in the description of each value, and is said when a border is crossed. */}
      {word === null ? null : (
        <p className={word.amiss ? "hl-rule-word hl-amiss" : "hl-rule-word"} aria-hidden="true">
          {word.amiss ? "‡ " : ""}
          <Runs runs={word.runs} macros={NO_MACROS} />
        </p>
      )}
    </div>
  );
}

/** Makes a region reachable from the keyboard when, and only when, it has to be scrolled sideways. */
function useSidewaysRegion(count: number): (place: HTMLElement | null) => void {
  const [place, setPlace] = useState<HTMLElement | null>(null);
  useEffect(() => {
    if (place === null || count === 0) return;
    const watch = new ResizeObserver(() => {
      if (place.scrollWidth > place.clientWidth + 1) place.tabIndex = 0;
      else place.removeAttribute("tabindex");
    });
    watch.observe(place);
    return () => watch.disconnect();
  }, [place, count]);
  return useCallback((next: HTMLElement | null) => setPlace(next), []);
}
