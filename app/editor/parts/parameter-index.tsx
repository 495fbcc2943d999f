import { type CSSProperties, type KeyboardEvent, type PointerEvent, useId, useRef } from "react";
import type { BorderFace } from "../model/borders.ts";
import { freeStep, type Scale, scaleOf, shownValue, sourceOf, stepped, valueAt } from "../model/scale.ts";
import type { ParameterFace } from "../model/types.ts";
import type { RuleEditing } from "../rule/rule-editing.ts";
import { strandColour } from "../text/contents.ts";
import { ParameterField } from "./parameter-field.tsx";
import { ParameterNote } from "./parameter-note.tsx";
import { ParameterScale } from "./parameter-scale.tsx";
import { useTrial } from "./parameter-trial.ts";
import { useTyping } from "./parameter-typing.ts";
import { type RuleWord, useAttended, useRuleWord } from "./rule-word.ts";
import { Runs } from "./runs.tsx";

interface Props {
  readonly parameter: ParameterFace;
  readonly borders: readonly BorderFace[];
  readonly place: number;
  onTry(name: string, source: string | null): void;
  onSet(name: string, source: string): void;
  onJudge(name: string, source: string): Promise<string>;
  /** null: for one who only reads. */
  readonly editing: RuleEditing | null;
  readonly onSay: (words: string) => void;
  readonly onWord: (name: string, word: RuleWord | null) => void;
}

/** A pointer that moved less than this, in px, has clicked. */
const CLICK_PX = 3;
const NO_MACROS = {};
const DIRECTIONS: Readonly<Record<string, 1 | -1>> = { ArrowRight: 1, ArrowUp: 1, ArrowLeft: -1, ArrowDown: -1 };

/**
 * One parameter of the rule:
 *
 *     at rest ──drag or arrow──▶ tried (previewed privately) ──release, Enter, or a pause──▶ set (one edit) ──▶ at rest
 *        │                            └──Esc──▶ at rest, as before
 *        └──digit, Enter or click──▶ typed ──Enter──▶ set, or said what is wrong;  ──Esc──▶ at rest, as before
 */
export function ParameterIndex({ parameter, borders, place, editing, onTry, onSet, onJudge, onSay, onWord }: Props) {
  const trial = useTrial(parameter, onTry, onSet);
  const typing = useTyping({ name: parameter.name, onJudge, onSettle: trial.settle, onWord, onSay });
  const { attended, attend } = useAttended();
  const description = useId();
  const drag = useRef<{ at: number; from: number; moved: boolean; last: number } | null>(null);
  const scale = scaleOf(parameter);
  const value = trial.tried ?? parameter.value;
  const movable = parameter.plain && value !== null;
  const { tried } = trial;
  const words = useRuleWord(parameter, borders, { tried, attended, onWord, onSay });

  const abandon = () => {
    drag.current = null;
    trial.putBack();
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const direction = DIRECTIONS[event.key];
    if (direction !== undefined && event.altKey && event.shiftKey) editing?.move(parameter.name, direction);
    else if (event.key === "Escape") abandon();
    else if (event.key === "Enter" && trial.tried !== null) trial.settle(sourceOf(trial.tried));
    else if (event.key === "Enter" || event.key === " ") typing.open(parameter.source);
    else if (/^[\d.+-]$/.test(event.key) && !event.ctrlKey && !event.metaKey && !event.altKey) typing.open(event.key);
    else if (direction !== undefined && movable) {
      const fineness = event.ctrlKey ? 10 : event.altKey ? 0.1 : 1;
      const next = stepped(value, scale?.step ?? freeStep(value, parameter.step), direction, fineness, scale);
      trial.attempt(next);
      trial.settleSoon(next);
    } else return;
    event.preventDefault();
  };

  const begin = (event: PointerEvent<Element>, from: number, moved: boolean) => {
    event.currentTarget.setPointerCapture(event.pointerId);
    // The keys go with the hand: Esc puts back what is dragged.
    event.currentTarget.closest(".hl-par")?.querySelector<HTMLElement>("[role=spinbutton]")?.focus();
    drag.current = { at: event.clientX, from, moved, last: from };
    if (moved) trial.attempt(from);
  };
  const move = (event: PointerEvent<Element>, width: number) => {
    const begun = drag.current;
    if (begun === null || scale === null || width <= 0) return;
    const by = event.clientX - begun.at;
    if (!begun.moved && Math.abs(by) < CLICK_PX) return;
    const next = draggedTo(scale, begun.from, by / width);
    if (begun.moved && next === begun.last) return;
    begun.moved = true;
    begun.last = next;
    trial.attempt(next);
  };
  const end = () => {
    const begun = drag.current;
    drag.current = null;
    if (begun === null) return;
    if (begun.moved) trial.settle(sourceOf(begun.last));
    else typing.open(parameter.source);
  };

  const label = parameter.note === "" ? parameter.name : `${parameter.name}, ${parameter.note}`;
  const shown = trial.tried === null ? parameter.shown : shownValue(trial.tried, parameter.source, parameter.step);
  const was = trial.tried === null ? parameter.was : parameter.value;
  const wasShown = trial.tried === null ? parameter.wasShown : parameter.shown;
  return (
    <div ref={attend} className="hl-par" style={{ "--strand": strandColour(place) } as CSSProperties}>
      <div className="hl-par-value">
        <Runs runs={[{ run: "math", tex: parameter.symbol }]} macros={NO_MACROS} /> ={" "}
        {typing.typed === null ? (
          <span
            role="spinbutton"
            tabIndex={0}
            className={scale !== null && movable ? "hl-par-handle hl-par-movable" : "hl-par-handle"}
            aria-label={label}
            aria-valuenow={value ?? 0}
            aria-valuemin={parameter.min ?? undefined}
            aria-valuemax={parameter.max ?? undefined}
            aria-describedby={description}
            aria-valuetext={parameter.unit === "" ? shown : `${shown} ${parameter.unit}`}
            data-parameter={parameter.name}
            onKeyDown={onKeyDown}
            onPointerDown={(event) => event.button === 0 && begin(event, value ?? 0, false)}
            onPointerMove={(event) => movable && move(event, widthOfScale(event.currentTarget))}
            onPointerUp={end}
            onPointerCancel={abandon}
          >
            {shown}
          </span>
        ) : (
          <ParameterField
            name={parameter.name}
            label={label}
            first={typing.typed}
            fault={typing.fault}
            onWrite={typing.write}
            onEnter={typing.enter}
            onEscape={() => typing.close()}
            onLeave={() => typing.close("left")}
          />
        )}
        {parameter.unit === "" ? null : <span className="hl-par-unit"> {parameter.unit}</span>}
        {was === null ? null : <span className="hl-par-was"> was {wasShown}</span>}
      </div>
      <ParameterNote parameter={parameter} onChange={editing === null ? null : () => editing.change(parameter.name)} />
      {scale === null || value === null ? null : (
        <ParameterScale
          scale={scale}
          value={value}
          was={was}
          borders={borders.map(({ at }) => at)}
          onPointerDown={(event) => {
            const box = event.currentTarget.getBoundingClientRect();
            if (!movable || event.button !== 0 || box.width <= 0) return;
            event.preventDefault();
            begin(event, valueAt(scale, (event.clientX - box.left) / box.width), true);
          }}
          onPointerMove={(event) => move(event, event.currentTarget.getBoundingClientRect().width)}
          onPointerUp={end}
          onPointerCancel={abandon}
        />
      )}
      <span id={description} className="hl-said">
        {words === "" ? `${parameter.hangs}.` : `${parameter.hangs}. ${words}`}
      </span>
    </div>
  );
}

function draggedTo(scale: Scale, from: number, share: number): number {
  return valueAt(scale, (from - scale.min) / (scale.max - scale.min) + share);
}

/** The scale beneath a value, whose width the value is dragged along. */
function widthOfScale(handle: Element): number {
  return handle.closest(".hl-par")?.querySelector(".hl-par-scale")?.getBoundingClientRect().width ?? 0;
}
