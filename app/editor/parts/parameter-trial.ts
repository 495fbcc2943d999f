import { useEffect, useRef, useState } from "react";
import { sourceOf } from "../model/scale.ts";
import type { ParameterFace } from "../model/types.ts";

/** How long after the last arrow key a value is let stand, in ms: a burst of steps is one edit. */
const SETTLE_MS = 900;

export interface Trial {
  /** The value being tried, or null at rest. */
  readonly tried: number | null;
  /** Tries a value privately; it is set when `settle` comes. */
  attempt(value: number): void;
  /** Sets what is tried, once the keys have rested. */
  settleSoon(value: number): void;
  /** Sets a source: one edit. The same source as before puts back instead. */
  settle(source: string): void;
  putBack(): void;
}

/**
 * A parameter on trial. The trial is bound to the source it began from: when the text has another one, whether by
 * this trial's end or by somebody else's edit, the text's own value shows again.
 */
export function useTrial(
  parameter: ParameterFace,
  onTry: (name: string, source: string | null) => void,
  onSet: (name: string, source: string) => void,
): Trial {
  const [trial, setTrial] = useState<{ value: number; from: string } | null>(null);
  const timer = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  useEffect(() => () => clearTimeout(timer.current), []);
  const tried = trial !== null && trial.from === parameter.source ? trial.value : null;

  const putBack = () => {
    clearTimeout(timer.current);
    setTrial(null);
    onTry(parameter.name, null);
  };
  const settle = (source: string) => {
    clearTimeout(timer.current);
    if (source === parameter.source) putBack();
    else onSet(parameter.name, source);
  };
  return {
    tried,
    attempt(value) {
      setTrial({ value, from: parameter.source });
      onTry(parameter.name, sourceOf(value));
    },
    settleSoon(value) {
      clearTimeout(timer.current);
      timer.current = setTimeout(() => settle(sourceOf(value)), SETTLE_MS);
    },
    settle,
    putBack,
  };
}
