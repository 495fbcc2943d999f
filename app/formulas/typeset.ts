import type { Decimal } from "./decimal.ts";
import type { PrintedNumber } from "./types.ts";

/** Everything that is decided about a number before its signs are set. */
export interface Layout {
  readonly value: Decimal;
  /** The place of the last digit printed. */
  readonly place: number;
  /** The number to all digits asked for, where they are more than the error supports. */
  readonly full: Decimal | null;
  readonly fullPlace: number;
  /** Digits of the standard error at `place`, printed in brackets. */
  readonly bracket: string | null;
  readonly supported: number;
  readonly isScientific: boolean;
  readonly isPercent: boolean;
  readonly unit: string;
}

const MINUS = "\u2212";
const SUPERSCRIPTS = "\u2070\u00b9\u00b2\u00b3\u2074\u2075\u2076\u2077\u2078\u2079";
const NO_BREAK = "\u00a0";

/** Sets the number as plain Unicode, as TeX and for siunitx. */
export function layOut(layout: Layout): PrintedNumber {
  const { value, place, isScientific, bracket } = layout;
  const power = isScientific && value.digits !== "" ? value.exponent : 0;
  const sign = value.negative ? "-" : "";
  const digits = sign + mantissaText(value, place, power);
  const brackets = bracket === null ? "" : `(${bracketText(bracket, value, place, power)})`;
  const sheetFull = layout.full === null ? "" : mantissaText(layout.full, layout.fullPlace, power);
  const known = layout.full === null ? digits : sign + truncated(sheetFull, place - power);
  const unknown = layout.full === null ? "" : sheetFull.slice(known.length - sign.length);
  const powerText = power === 0 ? "" : `×10${superscript(power)}`;
  const unitText = layout.unit === "" ? "" : NO_BREAK + unitAsText(layout.unit);
  const percentText = layout.isPercent ? `${NO_BREAK}%` : "";
  const rest = brackets + powerText + percentText + unitText;
  const powerTex = power === 0 ? "" : `\\times10^{${power}}`;
  const percentTex = layout.isPercent ? "\\,\\%" : "";
  const unitTex = layout.unit === "" ? "" : `\\,${unitAsTex(layout.unit)}`;
  const num = `\\num{${digits}${brackets}${power === 0 ? "" : `e${power}`}}`;
  return {
    text: digits.replace("-", MINUS) + rest,
    tex: digits + brackets + powerTex + percentTex + unitTex,
    siunitx: num + percentTex + unitTex,
    unsupported: unknown,
    supported: layout.supported,
    sheet: { known: known.replace("-", MINUS), unknown, rest },
  };
}

/** Digits with their decimal point, divided by 10^power, down to the place. */
function mantissaText(d: Decimal, place: number, power: number): string {
  const first = d.digits === "" ? 0 : d.exponent - power;
  const last = place - power;
  let text = "";
  for (let p = Math.max(first, 0); p >= Math.min(last, 0); p--) {
    if (p === -1) text += ".";
    text += d.digits[first - p] ?? "0";
  }
  return text;
}

/** The part of the text from its beginning to the digit at the place, of a number with a digit at 10^0. */
function truncated(text: string, place: number): string {
  const point = text.indexOf(".");
  const units = (point < 0 ? text.length : point) - 1;
  if (place >= 0) return text.slice(0, Math.max(0, units + 1 - place));
  return text.slice(0, units + 2 - place);
}

/** 11.4(3), but 0.5(12) would mislead where the error reaches left of the point: then 0.5(1.2). */
function bracketText(bracket: string, value: Decimal, place: number, power: number): string {
  const last = place - power;
  if (last >= 0) return bracket + "0".repeat(last);
  if (bracket.length <= -last) return bracket;
  const error: Decimal = { negative: false, digits: bracket, exponent: place + bracket.length - 1 };
  return value.digits.length < bracket.length ? mantissaText(error, place, power) : mantissaText(error, place, power);
}

function superscript(n: number): string {
  const digits = [...String(Math.abs(n))].map((digit) => SUPERSCRIPTS[Number(digit)] ?? "").join("");
  return (n < 0 ? "\u207b" : "") + digits;
}

/** km^2 → km², yr^-1 → yr⁻¹. */
function unitAsText(unit: string): string {
  return unit.replace(/\^\{?(-?\d+)\}?/g, (_, n: string) => superscript(Number(n)));
}

/** Upright, with powers raised and every other sign of TeX made harmless. */
function unitAsTex(unit: string): string {
  const parts = unit.split(/\^\{?(-?\d+)\}?/);
  const tex = parts.map((part, i) => (i % 2 === 1 ? `^{${part}}` : `\\text{${part.replace(/[\\{}$&#%_^~]/g, " ")}}`));
  return `\\mathrm{${tex.filter((part) => part !== "\\text{}").join("")}}`;
}
