import { type RefCallback, useCallback, useEffect, useMemo, useState } from "react";
import {
  type BorderFace,
  borderRuns,
  borderWords,
  crossedBorder,
  scaleRuns,
  scaleWords,
  sideOf,
} from "../model/borders.ts";
import type { ParameterFace, Run } from "../model/types.ts";

/** What stands beneath the rule about one parameter; `amiss` where cells lose their answer. */
export interface RuleWord {
  readonly runs: readonly Run[];
  readonly amiss: boolean;
}

interface Attention {
  /** The value being tried, or null at rest. */
  readonly tried: number | null;
  /** It is pointed at, or has the keys. */
  readonly attended: boolean;
  readonly onWord: (name: string, word: RuleWord | null) => void;
  /** The same function at each call: what it is given is said once. */
  readonly onSay: (words: string) => void;
}

/**
 * Tells the rule what is to be said of a parameter: that a tried value has crossed a border, at once and aloud; or, while
 * it is attended to, what its borders are; otherwise nothing.
 * @returns the borders in plain words, "" where there are none
 */
export function useRuleWord(
  { name, symbol, value }: ParameterFace,
  borders: readonly BorderFace[],
  { tried, attended, onWord, onSay }: Attention,
): string {
  const crossed = crossedBorder(borders, value, tried);
  const side = crossed === null || tried === null ? null : sideOf(crossed, tried);
  const attends = attended && borders.length > 0;
  const word = useMemo((): RuleWord | null => {
    if (crossed !== null && side !== null)
      return { runs: borderRuns(symbol, crossed, side), amiss: crossed[side].without.length > 0 };
    return attends ? { runs: scaleRuns(symbol, borders, value), amiss: false } : null;
  }, [symbol, borders, value, crossed, side, attends]);
  const aloud = crossed === null || side === null ? "" : borderWords(name, crossed, side);

  useEffect(() => onWord(name, word), [name, word, onWord]);
  useEffect(() => () => onWord(name, null), [name, onWord]);
  useEffect(() => {
    if (aloud !== "") onSay(aloud);
  }, [aloud, onSay]);
  return useMemo(() => scaleWords(name, borders, value), [name, borders, value]);
}

/** Whether something is pointed at, or has the keys; `attend` is its ref. */
export function useAttended(): { readonly attended: boolean; readonly attend: RefCallback<HTMLElement> } {
  const [pointed, setPointed] = useState(false);
  const [keyed, setKeyed] = useState(false);
  const attend = useCallback((place: HTMLElement) => {
    const ending = new AbortController();
    const { signal } = ending;
    place.addEventListener("pointerenter", () => setPointed(true), { signal });
    place.addEventListener("pointerleave", () => setPointed(false), { signal });
    place.addEventListener("focusin", () => setKeyed(true), { signal });
    place.addEventListener("focusout", () => setKeyed(false), { signal });
    return () => ending.abort();
  }, []);
  return { attended: pointed || keyed, attend };
}
