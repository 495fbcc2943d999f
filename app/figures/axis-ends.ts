import { xEnds, yEnds } from "./range.ts";
import type { Figure } from "./types.ts";

/**
 * Where the axes of a figure end, in data units, rounded outwards to few digits so that they can be read and written; null
 * for an axis whose ends a double cannot hold.
 */
export function axisEnds(figure: Figure): Readonly<Record<"x" | "y", readonly [number, number] | null>> {
  const inUnits = (axis: Figure["x"], { low, high }: { readonly low: number; readonly high: number }) => {
    const [from, to] = axis.scale === "log" ? [10 ** low, 10 ** high] : [low, high];
    const ends = [rounded(from, Math.floor), rounded(to, Math.ceil)] as const;
    return Number.isFinite(ends[0]) && Number.isFinite(ends[1]) && (axis.scale === "linear" || ends[0] > 0)
      ? ends
      : null;
  };
  return { x: inUnits(figure.x, xEnds(figure)), y: inUnits(figure.y, yEnds(figure)) };
}

/** Digits after the first. */
const FURTHER_DIGITS = 3;

/** A number to few digits, downwards or upwards; what it is already is not changed. */
function rounded(value: number, towards: (x: number) => number): number {
  if (!Number.isFinite(value)) return value;
  const [mantissa = "", exponent = ""] = value.toExponential(12).split("e");
  const whole = towards(Number((Number(mantissa) * 10 ** FURTHER_DIGITS).toPrecision(12)));
  // As decimal text: a power of ten would bring digits of its own.
  return Number(`${whole}e${Number(exponent) - FURTHER_DIGITS}`);
}
