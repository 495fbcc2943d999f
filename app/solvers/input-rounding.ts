import type { Offspring } from "./types.ts";

/** Half a unit in the last place, relative. */
export const HALF_UNIT = 2 ** -53;

/** A double whose last 20 bits are 0 is taken for exactly the number that was meant (2, 0.5, 0.625): a decimal that had to be
 *  rounded ends in 20 zero bits once in a million. */
const EXACT_BITS = 20;

const words = new Uint32Array(2);
const double = new Float64Array(words.buffer);
/** Doubles are stored low word first on every platform this runs on; checked once with 1, whose low word is 0. */
const LOW = lowWord();

function lowWord(): 0 | 1 {
  double[0] = 1;
  return words[0] === 0 ? 0 : 1;
}

/** By how much, relative, the number that was meant may differ from the double it became. */
export function inputUnit(x: number): number {
  double[0] = x;
  const tail = (words[LOW] as number) & (2 ** EXACT_BITS - 1);
  return tail === 0 ? 0 : HALF_UNIT;
}

/** The largest of these over the numbers of an offspring law. */
export function lawUnit(offspring: Offspring): number {
  if (offspring.law !== "finite") return inputUnit(offspring.mean);
  return offspring.probabilities.reduce((largest, p) => Math.max(largest, inputUnit(p)), 0);
}
