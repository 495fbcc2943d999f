import { type KeyboardEvent, type PointerEvent, useMemo, useState } from "react";
import { type Figure, FigurePlate, type PlacedPoint, placePoints } from "../figures/index.ts";
import type { CurveReadings } from "./readings.ts";

interface Props {
  readonly figure: Figure;
  readonly readings: readonly CurveReadings[];
  /** [px] */
  readonly width: number;
  readonly height?: number;
}

interface Curve {
  readonly name: string;
  readonly points: readonly ReadPoint[];
}

interface ReadPoint extends PlacedPoint {
  readonly text: string;
}

/** A point of a curve by its number. */
interface Asked {
  readonly curve: number;
  readonly at: number;
}

/**
 * A plate that is read: by the pointer, and by the keyboard with Tab from curve to curve and the arrows along one. Each
 * curve is a slider whose value is said in words.
 */
export function PlateReader({ figure, readings, width, height }: Props) {
  const placed = useMemo(() => placePoints(figure, { width, height }), [figure, width, height]);
  const curves = useMemo(() => readableCurves(placed.curves, readings), [placed, readings]);
  const [asked, setAsked] = useState<Asked | null>(null);
  const point = asked === null ? undefined : curves[asked.curve]?.points[asked.at];
  const find = (event: PointerEvent<HTMLDivElement>) => {
    const { left, top, width: drawn } = event.currentTarget.getBoundingClientRect();
    const unit = width / drawn;
    setAsked(nearest(curves, (event.clientX - left) * unit, (event.clientY - top) * unit));
  };
  const placeOf = ({ x, y }: PlacedPoint) => ({
    left: `${((100 * x) / placed.width).toFixed(3)}%`,
    top: `${((100 * y) / placed.height).toFixed(3)}%`,
  });
  return (
    <div className="plate-read" style={{ maxWidth: width }} onPointerMove={find} onPointerLeave={() => setAsked(null)}>
      <FigurePlate figure={figure} width={width} height={height} />
      {curves.map((curve, k) => (
        <CurveSlider
          key={curve.name}
          curve={curve}
          at={asked?.curve === k ? asked.at : null}
          placeOf={placeOf}
          onAsk={(at) => setAsked(at === null ? null : { curve: k, at })}
        />
      ))}
      {point === undefined ? null : (
        <span
          className={point.x > placed.width / 2 ? "plate-reading plate-reading-left" : "plate-reading"}
          style={placeOf(point)}
          aria-hidden="true"
        >
          {point.text}
        </span>
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
}

function CurveSlider({ curve, at, placeOf, onAsk }: SliderProps) {
  const [last, setLast] = useState(0);
  const here = at ?? last;
  const point = curve.points[here];
  if (point === undefined) return null;
  const walk = (event: KeyboardEvent) => {
    const to = STEPS[event.key]?.(here, curve.points.length - 1);
    if (to === undefined) return;
    event.preventDefault();
    const next = Math.min(Math.max(to, 0), curve.points.length - 1);
    setLast(next);
    onAsk(next);
  };
  return (
    <div
      className={at === null ? "plate-point" : "plate-point plate-point-read"}
      style={placeOf(point)}
      role="slider"
      tabIndex={0}
      aria-label={`Along ${curve.name}`}
      aria-valuemin={1}
      aria-valuemax={curve.points.length}
      aria-valuenow={here + 1}
      aria-valuetext={point.text}
      onFocus={() => onAsk(last)}
      onBlur={() => onAsk(null)}
      onKeyDown={walk}
    />
  );
}

/** Points that Page Up and Page Down pass over. */
const LEAP = 10;

const STEPS: Readonly<Record<string, (at: number, last: number) => number>> = {
  ArrowRight: (at) => at + 1,
  ArrowLeft: (at) => at - 1,
  ArrowUp: (at) => at + 1,
  ArrowDown: (at) => at - 1,
  PageUp: (at) => at + LEAP,
  PageDown: (at) => at - LEAP,
  Home: () => 0,
  End: (_, last) => last,
};

/** Curves with at least a point that has something to say. */
function readableCurves(
  curves: ReturnType<typeof placePoints>["curves"],
  readings: readonly CurveReadings[],
): readonly Curve[] {
  return curves.flatMap(({ points }, k) => {
    const { name = "", texts = [] } = readings[k] ?? {};
    const read = points.flatMap((point) => {
      const text = texts[point.i] ?? "";
      return text === "" ? [] : [{ ...point, text }];
    });
    return read.length === 0 ? [] : [{ name, points: read }];
  });
}

/** The pointer reads a point when it is this near [px]. */
const REACH = 40;

function nearest(curves: readonly Curve[], x: number, y: number): Asked | null {
  let found: Asked | null = null;
  let distance = REACH;
  curves.forEach(({ points }, curve) => {
    points.forEach((point, at) => {
      const apart = Math.hypot(point.x - x, point.y - y);
      if (apart >= distance) return;
      distance = apart;
      found = { curve, at };
    });
  });
  return found;
}
