import { useEffect, useRef, useState } from "react";
import { isPlainNumber } from "../model/scale.ts";
import { focusHandle } from "../rule/handles.ts";
import type { RuleWord } from "./rule-word.ts";

interface Typing {
  /** What the field begins with; null: none is open. */
  readonly typed: string | null;
  readonly fault: string;
  open(first: string): void;
  /** What was entered stands when nothing is against it; else the field stays, with what is. */
  enter(source: string): void;
  /** Something else is written: what was said of the last is gone. */
  write(): void;
  /** Puts back. The keys go to the value again, unless it was `left` for something else. */
  close(left?: "left"): void;
}

interface Given {
  readonly name: string;
  onJudge(name: string, source: string): Promise<string>;
  onSettle(source: string): void;
  onWord(name: string, word: RuleWord | null): void;
  onSay(words: string): void;
}

/**
 * A value typed on the rule. A plain number stands at once; a formula is read first, and what is wrong with it is said
 * at the field, beneath the rule and aloud.
 */
export function useTyping({ name, onJudge, onSettle, onWord, onSay }: Given): Typing {
  const [typed, setTyped] = useState<string | null>(null);
  const [fault, setFault] = useState("");
  // Counts what was entered, written and closed: an answer to an earlier one is not wanted any more.
  const turn = useRef(0);
  const place = `${name}, typed`;
  useEffect(() => {
    onWord(place, fault === "" ? null : { runs: [{ run: "text", text: fault }], amiss: true });
    return () => onWord(place, null);
  }, [place, fault, onWord]);
  const begin = (first: string | null) => {
    turn.current += 1;
    setFault("");
    setTyped(first);
  };
  return {
    typed,
    fault,
    open: begin,
    close(left) {
      begin(null);
      if (left === undefined) focusHandle(name);
    },
    write() {
      turn.current += 1;
      setFault("");
    },
    enter(source) {
      const stand = () => {
        begin(null);
        onSettle(source);
        focusHandle(name);
      };
      if (isPlainNumber(source)) {
        stand();
        return;
      }
      turn.current += 1;
      const asked = turn.current;
      void onJudge(name, source).then((found) => {
        if (asked !== turn.current) return;
        setFault(found);
        if (found === "") stand();
        else onSay(found);
      });
    },
  };
}
