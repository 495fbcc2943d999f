import { useCallback, useEffect, useState } from "react";
import type { ParameterFace } from "../model/types.ts";
import { ParameterIndex } from "./parameter-index.tsx";

interface Props {
  readonly parameters: readonly ParameterFace[];
  /** Shows privately what follows of a value; null ends it. Nothing is kept. */
  onTry(name: string, source: string | null): void;
  /** Lets a value stand: one edit of the text, or of the private trial of one who only reads. */
  onSet(name: string, source: string): void;
}

/**
 * The parameters of the paper at its head, each with its scale. It stays at the top while the sheet scrolls, and
 * scrolls sideways where it is too wide. Says so when there are none.
 */
export function ParameterRule({ parameters, onTry, onSet }: Props) {
  const scrolled = useSidewaysRegion(parameters.length);
  if (parameters.length === 0) return null;
  return (
    <section className="hl-rule" aria-label="Parameters" ref={scrolled}>
      <div className="hl-rule-row">
        {parameters.map((parameter, place) => (
          <ParameterIndex key={parameter.name} parameter={parameter} place={place} onTry={onTry} onSet={onSet} />
        ))}
      </div>
    </section>
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
