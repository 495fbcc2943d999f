import { type RefObject, useCallback, useEffect, useRef } from "react";
import { Command } from "../../ui/index.ts";
import type { Desk } from "../live/desk.ts";
import { followStrand } from "./follow.ts";
import { ParameterValues } from "./gloss-text.tsx";
import { numberAt, showDigits } from "./tapped-number.ts";
import { useStrands } from "./use-strands.ts";
import { useTapped } from "./use-tapped.ts";
import type { StrandWatch } from "./watch.ts";

interface Props {
  readonly desk: Desk;
  readonly watch: StrandWatch;
  readonly sheet: RefObject<HTMLElement | null>;
  readonly writes: boolean;
}

/**
 * On a narrow page a number that is tapped does not open: a slip from below says what the margin says elsewhere, and
 * has the commands.
 */
export function NumberSlip({ desk, watch, sheet, writes }: Props) {
  const narrow = useStrands(watch, ({ picture }) => picture?.frame.size === "narrow");
  const gloss = useStrands(watch, (view) => view.gloss);
  const tapped = useTapped(desk, watch, sheet, narrow);
  const place = useRef<HTMLElement>(null);
  useEffect(() => {
    if (tapped.element !== null) place.current?.focus({ preventScroll: true });
  }, [tapped.element]);
  const { forget } = tapped;
  const close = useCallback(() => {
    forget();
    watch.lights.letGo();
  }, [forget, watch]);
  useEscape(tapped.element !== null, close);
  const { view } = desk;
  if (!narrow || tapped.element === null || view === null || gloss === null) return null;
  const number = numberAt(view, tapped.element);
  const said = gloss.lead.map(({ name, known, unknown }) => `${name} = ${known}${unknown}`).join("; ");
  return (
    <section ref={place} className="hl-slip" role="dialog" aria-label={said} tabIndex={-1}>
      <div className="hl-slip-head">
        <span>{gloss.lead.map(({ name }) => name).join("; ")}</span>
        <Command onClick={close}>Close</Command>
      </div>
      {gloss.lead.map(({ name, known, unknown }) => (
        <p key={name} className="hl-slip-value">
          {known}
          <span className="hl-unknown">{unknown}</span>
        </p>
      ))}
      <p className="hl-slip-told">
        {gloss.parameters.length === 0 ? null : "hangs from "}
        <ParameterValues parameters={gloss.parameters} />
        {gloss.parameters.length > 0 && gloss.where !== "" ? ", " : null}
        {[gloss.where, gloss.also].filter((part) => part !== "").join("; ")}
      </p>
      <div className="hl-slip-commands">
        <Command
          onClick={() => {
            followStrand(view);
            tapped.forget();
          }}
        >
          Follow the strand
        </Command>
        {number === null || number.digits === null || !writes ? null : (
          <Digits shown={number.digits} onShow={(digits) => showDigits(view, number, digits)} />
        )}
        {number === null || !writes ? null : (
          <Command
            onClick={() => {
              close();
              view.dispatch({ selection: { anchor: number.to } });
              view.focus();
            }}
          >
            Show its source
          </Command>
        )}
      </div>
    </section>
  );
}

/** Esc closes, wherever the focus is. */
function useEscape(open: boolean, close: () => void): void {
  useEffect(() => {
    if (!open) return;
    const ended = new AbortController();
    const onKey = ({ key }: KeyboardEvent) => key === "Escape" && close();
    document.addEventListener("keydown", onKey, { signal: ended.signal });
    return () => ended.abort();
  }, [open, close]);
}

interface DigitsProps {
  readonly shown: number;
  onShow(digits: number): void;
}

function Digits({ shown, onShow }: DigitsProps) {
  return (
    <span>
      Digits shown: {shown}{" "}
      <Command onClick={() => onShow(shown - 1)} aria-label="One digit fewer">
        fewer
      </Command>{" "}
      <Command onClick={() => onShow(shown + 1)} aria-label="One digit more">
        more
      </Command>
    </span>
  );
}
