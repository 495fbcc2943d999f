import { findRoot } from "./root.ts";

/** Stretches in which a change of sign is looked for. */
const STRETCHES = 240;

/** Zeros of a function in an interval, found by its changes of sign: one that only touches 0 is found where it is 0 exactly.
 *  Source: as findRoot.
 *  @param f known to rounding; not finite where it has no value   @param known zeros that are there anyway, kept as given
 *  @returns all of them in rising order, each once */
export function zerosOf(
  f: (x: number) => number,
  from: number,
  to: number,
  known: readonly number[],
): readonly number[] {
  const found: number[] = [];
  const near = (to - from) / STRETCHES / 1000;
  const add = (x: number): void => {
    if (found.every((other) => Math.abs(other - x) > near)) found.push(x);
  };
  for (const x of known) if (x >= from && x <= to) add(x);
  const at = (i: number): number => from + ((to - from) * i) / STRETCHES;
  const size = Array.from({ length: STRETCHES + 1 }, (_, i) => Math.abs(f(at(i))))
    .filter(Number.isFinite)
    .reduce((sum, value) => sum + value / STRETCHES, 0);
  const probe = (x: number) => ({ mantissa: f(x), exponent: 0, error: 2 * Number.EPSILON * size });
  for (let i = 0; i < STRETCHES; i += 1) {
    const [a, b] = [f(at(i)), f(at(i + 1))];
    if (a === 0) add(at(i));
    if (a * b >= 0 || !Number.isFinite(a * b)) continue;
    const root = findRoot(probe, at(i), at(i + 1));
    if (!("why" in root)) add(root.root.value);
    else if (root.why === "undecided end") add(root.end.x);
  }
  return found.sort((a, b) => a - b);
}
