import { type KeyboardEvent, type PointerEvent, useState } from "react";
import { type Curve, nearestPoint, walkedTo } from "../../figures/index.ts";
import { type Arrow, nextBox } from "../case/arrows.ts";
import type { EntryPlace, FigurePlace, QuotePlace } from "./places.ts";

interface Props {
  readonly places: readonly QuotePlace[];
  /** What is pointed at, by its formula and the cell that it stands in. */
  onPoint(formula: string, slot: string): void;
  onChoose(formula: string): void;
}

/** Lies over the column while a value is quoted: each number that can be pointed at is a place of its own. */
export function QuoteLayer({ places, onPoint, onChoose }: Props) {
  return (
    <div className="hl-quote-layer">
      {places.map((place) =>
        place.place === "entry" ? (
          <Entry key={`${place.slot} ${place.formula}`} entry={place} onPoint={onPoint} onChoose={onChoose} />
        ) : (
          <FigureCurves key={`${place.slot} figure`} figure={place} onPoint={onPoint} onChoose={onChoose} />
        ),
      )}
    </div>
  );
}

type Acts = Pick<Props, "onPoint" | "onChoose">;

function Entry({ entry, onPoint, onChoose }: Acts & { readonly entry: EntryPlace }) {
  const { formula, text, slot, left, top, width, height } = entry;
  return (
    <button
      type="button"
      className="hl-quote-entry"
      style={{ left, top, width, height }}
      aria-label={`Quote ${formula}, ${text}`}
      onFocus={() => onPoint(formula, slot)}
      onPointerEnter={() => onPoint(formula, slot)}
      onKeyDown={moveAmongEntries}
      onClick={() => onChoose(formula)}
    />
  );
}

const ARROWS: ReadonlySet<string> = new Set(["ArrowUp", "ArrowDown", "ArrowLeft", "ArrowRight"]);

/** The arrows lead from number to number as they lie on the page. */
function moveAmongEntries(event: KeyboardEvent<HTMLElement>): void {
  if (!ARROWS.has(event.key)) return;
  event.preventDefault();
  const here = event.currentTarget;
  const entries = [...(here.parentElement?.querySelectorAll<HTMLElement>(".hl-quote-entry") ?? [])];
  const boxes = entries.map((entry) => entry.getBoundingClientRect());
  entries[nextBox(boxes, entries.indexOf(here), event.key as Arrow)]?.focus();
}

/** A figure's points: the pointer takes the nearest, the keys go along a curve. */
function FigureCurves({ figure, onPoint, onChoose }: Acts & { readonly figure: FigurePlace }) {
  const [pointed, setPointed] = useState<{ readonly curve: number; readonly at: number } | null>(null);
  const { slot, title, left, top, width, height, unit, curves } = figure;
  const scale = width / unit;
  const find = (event: PointerEvent<HTMLElement>) => {
    const box = event.currentTarget.getBoundingClientRect();
    const found = nearestPoint(curves, (event.clientX - box.left) / scale, (event.clientY - box.top) / scale);
    setPointed(found);
    const formula = found === null ? undefined : curves[found.curve]?.points[found.at]?.text;
    if (formula !== undefined) onPoint(formula, slot);
    return formula;
  };
  const point = pointed === null ? undefined : curves[pointed.curve]?.points[pointed.at];
  return (
    <div className="hl-quote-figure" style={{ left, top, width, height }}>
      <button
        type="button"
        tabIndex={-1}
        aria-hidden="true"
        className="hl-quote-ground"
        onPointerMove={find}
        onPointerLeave={() => setPointed(null)}
        onPointerUp={(event) => {
          const formula = find(event);
          if (formula !== undefined) onChoose(formula);
        }}
      />
      {curves.map((curve, k) => (
        <CurvePlace
          key={curve.name}
          curve={curve}
          scale={scale}
          title={title}
          onPoint={(at) => {
            setPointed({ curve: k, at });
            onPoint(curve.points[at]?.text ?? "", slot);
          }}
          onChoose={onChoose}
        />
      ))}
      {point === undefined ? null : (
        <span className="hl-quote-point" style={{ left: point.x * scale, top: point.y * scale }} aria-hidden="true" />
      )}
    </div>
  );
}

interface CurveProps {
  readonly curve: Curve;
  readonly scale: number;
  readonly title: string;
  onPoint(at: number): void;
  onChoose(formula: string): void;
}

function CurvePlace({ curve: { name, points }, scale, title, onPoint, onChoose }: CurveProps) {
  const [at, setAt] = useState(0);
  const here = points[Math.min(at, points.length - 1)];
  if (here === undefined) return null;
  const press = (event: KeyboardEvent) => {
    if (event.key === "Enter" || event.key === " ") {
      event.preventDefault();
      onChoose(here.text);
      return;
    }
    const next = walkedTo(event.key, at, points.length);
    if (next === null) return;
    event.preventDefault();
    setAt(next);
    onPoint(next);
  };
  return (
    <div
      className="hl-quote-curve"
      style={{ left: here.x * scale, top: here.y * scale }}
      role="slider"
      tabIndex={0}
      aria-label={`Quote a point of ${name}, ${title}`}
      aria-valuemin={1}
      aria-valuemax={points.length}
      aria-valuenow={at + 1}
      aria-valuetext={here.text}
      onFocus={() => onPoint(at)}
      onKeyDown={press}
    />
  );
}
