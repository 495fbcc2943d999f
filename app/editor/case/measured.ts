import type { ValueNow } from "../model/messages.ts";
import type { ParameterFace } from "../model/types.ts";
import type { Asked } from "./asked.ts";
import type { CaseKnowledge } from "./types.ts";

/** Of a paper's results, those that one mostly wants to see move come first. */
export const PREFERRED: readonly string[] = ["mean", "s0", "far_decay", "decay", "constant"];

/** A number among the paper's results: the one that is asked for, else one that is well worth asking for. */
export function numberWanted({ words }: Asked, knowledge: CaseKnowledge): { cell: string; member: string } | null {
  const numbers = knowledge.names.cells.flatMap((cell) =>
    cell.values
      .filter(({ name }) => isNumber(knowledge.values.get(`${cell.name}.${name}`)))
      .map(({ name }) => ({ cell: cell.name, member: name })),
  );
  const asked = numbers.find(({ cell, member }) => words.includes(`${cell}.${member}`) || words.includes(member));
  if (asked !== undefined) return asked;
  const ofCell = numbers.filter(({ cell }) => words.includes(cell));
  for (const some of [ofCell, numbers]) {
    for (const member of PREFERRED) {
      const found = some.find((one) => one.member === member);
      if (found !== undefined) return found;
    }
  }
  return ofCell[0] ?? null;
}

/** What is not known yet may be a number. */
function isNumber(value: ValueNow | undefined): boolean {
  return value === undefined || (value.reason === "" && numberOf(value) !== null);
}

/** A value as a double; null where it is none. */
export function numberOf({ known, unknown, rest }: ValueNow): number | null {
  const digits = `${known}${unknown}`.replace(/\s/g, "").replace("−", "-");
  const power = /^×10([⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+)/.exec(rest)?.[1] ?? "";
  const exponent = [...power].map((sign) => (sign === "⁻" ? "-" : String("⁰¹²³⁴⁵⁶⁷⁸⁹".indexOf(sign)))).join("");
  const number = digits === "" ? Number.NaN : Number(exponent === "" ? digits : `${digits}e${exponent}`);
  return Number.isFinite(number) ? number : null;
}

/** A parameter to vary: the one asked for, else the first with a scale from which the cell hangs. */
export function parameterWanted({ words }: Asked, cell: string, knowledge: CaseKnowledge): ParameterFace | null {
  const { parameters } = knowledge;
  const asked = parameters.find(({ name }) => words.includes(name));
  if (asked !== undefined) return asked;
  const strands = knowledge.cells.find(({ name }) => name === cell)?.strands ?? [];
  const hung = parameters.filter((_, place) => strands.includes(place));
  return hung.find(({ min, max }) => min !== null && max !== null) ?? hung[0] ?? null;
}

/** The ends between which a parameter is varied: its scale, or about its value. */
export function endsOf({ min, max, value }: ParameterFace): readonly [string, string] {
  if (min !== null && max !== null) return [String(min), String(max)];
  const middle = value === null || value === 0 ? 1 : value;
  const ends = [middle / 2, middle * 2].sort((a, b) => a - b);
  return [String(ends[0]), String(ends[1])];
}

/** To so many digits, as a formula. */
export function rounded(number: number, digits: number): string {
  return String(Number(number.toPrecision(digits)));
}

/** A round number above another. */
export function roundAbove(number: number): string {
  if (number === 0) return "1";
  const unit = 10 ** (Math.floor(Math.log10(Math.abs(number))) - 1);
  return rounded((Math.floor(number / unit) + 1) * unit, 4);
}
