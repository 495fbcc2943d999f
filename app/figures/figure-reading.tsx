import { type KeyboardEvent, type PointerEvent, useEffect, useLayoutEffect, useMemo, useRef, useState } from "react";
import { type PlacedPoint, placePoints } from "./point-places.ts";
import { type Curve, nearestPoint, type PointAsked, readableCurves } from "./readable-curves.ts";
import type { CurveReadings, Figure } from "./types.ts";
import { walkedTo } from "./walking.ts";

interface Props {
  readonly figure: Figure;
  readonly readings: readonly CurveReadings[];
  /** Of the plate beneath, as it was laid out [px]. */
  readonly width: number;
  readonly height?: number;
  /** Where the pointer was when this came under it, in the window. */
  readonly pointed?: { readonly clientX: number; readonly clientY: number } | null;
  /** Whether Tab comes to the curves. */
  readonly curvesByTab: boolean;
  /** Takes the keys as it appears: to the first curve. */
  readonly takesKeys?: boolean;
  /** Esc was pressed on a curve, or the keys went elsewhere. */
  onLeave?(by: "escape" | "focus"): void;
}

/**
 * Lies over a plate and reads it: by the pointer, and by the keyboard with Tab from curve to curve and the arrows along
 * one. Each curve is a slider whose value is said in words. What holds it and the plate has the class `figure-read`.
 */
export function FigureReading(props: Props) {
  const { figure, readings, width, height, pointed = null, curvesByTab, takesKeys = false, onLeave } = props;
  const placed = useMemo(() => placePoints(figure, { width, height }), [figure, width, height]);
  const curves = useMemo(() => readableCurves(placed.curves, readings), [placed, readings]);
  const [asked, setAsked] = useState<PointAsked | null>(null);
  const ground = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (takesKeys) ground.current?.querySelector<HTMLElement>("[role=slider]")?.focus();
  }, [takesKeys]);
  const point = asked === null ? undefined : curves[asked.curve]?.points[asked.at];
  const pointAt = (place: Element, { clientX, clientY }: { readonly clientX: number; readonly clientY: number }) => {
    const { left, top, width: drawn } = place.getBoundingClientRect();
    const unit = width / drawn;
    setAsked(nearestPoint(curves, (clientX - left) * unit, (clientY - top) * unit));
  };
  const first = useRef(() => {
    if (ground.current !== null && pointed !== null) pointAt(ground.current, pointed);
  });
  useLayoutEffect(() => first.current(), []);
  const find = (event: PointerEvent<HTMLDivElement>) => pointAt(event.currentTarget, event);
  const placeOf = ({ x, y }: PlacedPoint) => ({
    left: `${((100 * x) / placed.width).toFixed(3)}%`,
    top: `${((100 * y) / placed.height).toFixed(3)}%`,
  });
  return (
    <div
      ref={ground}
      className="figure-reading"
      onPointerMove={find}
      onPointerDown={find}
      // A finger that is lifted leaves as well: what it asked for stays to be read.
      onPointerLeave={(event) => event.pointerType !== "touch" && setAsked(null)}
    >
      {curvesByTab
        ? curves.map((curve, k) => (
            <CurveSlider
              key={curve.name}
              curve={curve}
              at={asked?.curve === k ? asked.at : null}
              placeOf={placeOf}
              onAsk={(at) => setAsked(at === null ? null : { curve: k, at })}
              onLeave={onLeave}
            />
          ))
        : null}
      {point === undefined ? null : (
        <>
          <span className="figure-reading-point" style={placeOf(point)} aria-hidden="true" />
          <span
            className={
              point.x > placed.width / 2 ? "figure-reading-words figure-reading-words-left" : "figure-reading-words"
            }
            style={placeOf(point)}
            aria-hidden="true"
          >
            {point.text}
          </span>
        </>
      )}
    </div>
  );
}

interface SliderProps {
  readonly curve: Curve;
  /** The point asked for; null while another curve, or none, is read. */
  readonly at: number | null;
  placeOf(point: PlacedPoint): { left: string; top: string };
  onAsk(at: number | null): void;
  readonly onLeave: Props["onLeave"];
}

function CurveSlider({ curve, at, placeOf, onAsk, onLeave }: SliderProps) {
  const [last, setLast] = useState(0);
  const here = at ?? last;
  const point = curve.points[here];
  if (point === undefined) return null;
  const walk = (event: KeyboardEvent) => {
    if (event.key === "Escape" && onLeave !== undefined) {
      event.preventDefault();
      event.stopPropagation();
      onLeave("escape");
      return;
    }
    const next = walkedTo(event.key, here, curve.points.length);
    if (next === null) return;
    event.preventDefault();
    setLast(next);
    onAsk(next);
  };
  return (
    <div
      className="figure-reading-slider"
      style={placeOf(point)}
      role="slider"
      tabIndex={0}
      aria-label={`Along ${curve.name}`}
      aria-valuemin={1}
      aria-valuemax={curve.points.length}
      aria-valuenow={here + 1}
      aria-valuetext={point.text}
      onFocus={() => onAsk(last)}
      onBlur={({ currentTarget, relatedTarget }) => {
        onAsk(null);
        const stays = relatedTarget instanceof Node && currentTarget.parentElement?.contains(relatedTarget);
        if (!stays) onLeave?.("focus");
      }}
      onKeyDown={walk}
    />
  );
}
