import { ticks } from "d3-array";

/** A parameter's scale on the rule: where it may go and in which steps. Pure. */
export interface Scale {
  readonly min: number;
  readonly max: number;
  readonly step: number;
}

/** How many fine ticks a scale has, about. */
const FINE_TICKS = 20;

/**
 * The scale of a parameter, or null when it has none (no least and greatest value are given).
 * Without a step, a twentieth of the range rounded to 1, 2 or 5 in its first digit.
 */
export function scaleOf(parameter: { min: number | null; max: number | null; step: number | null }): Scale | null {
  const { min, max, step } = parameter;
  if (min === null || max === null || !(max > min)) return null;
  return { min, max, step: step !== null && step > 0 ? step : niceStep((max - min) / FINE_TICKS) };
}

/** Step by the arrow keys of a parameter that has no scale: a twentieth of its size, at least 0.01 near 0. */
export function freeStep(value: number, step: number | null): number {
  if (step !== null && step > 0) return step;
  return value === 0 ? 0.1 : niceStep(Math.abs(value) / FINE_TICKS);
}

function niceStep(rough: number): number {
  const power = 10 ** Math.floor(Math.log10(rough));
  const lead = rough / power;
  return (lead < 1.5 ? 1 : lead < 3.5 ? 2 : lead < 7.5 ? 5 : 10) * power;
}

/** Share of the scale at which a value stands, from 0 to 1. */
export function shareOf(scale: Scale, value: number): number {
  return Math.min(1, Math.max(0, (value - scale.min) / (scale.max - scale.min)));
}

/** The value at a share of the scale, on its nearest step. */
export function valueAt(scale: Scale, share: number): number {
  const raw = scale.min + Math.min(1, Math.max(0, share)) * (scale.max - scale.min);
  return within(scale, onStep(raw, scale.step, scale.min));
}

/**
 * One step of the arrow keys: `direction` ±1, `fineness` 1, 0.1 (Alt) or 10 (Ctrl). Goes to the next multiple of the
 * step, so that a typed value in between falls back on the grid; finer steps keep it.
 */
export function stepped(value: number, step: number, direction: 1 | -1, fineness: number, scale: Scale | null): number {
  const width = step * fineness;
  const next = Number((value + direction * width).toPrecision(12));
  const settled = fineness >= 1 && scale !== null ? onStep(next, step, scale.min) : next;
  return scale === null ? settled : within(scale, settled);
}

function onStep(value: number, step: number, from: number): number {
  return Number((from + Math.round((value - from) / step) * step).toPrecision(12));
}

function within(scale: Scale, value: number): number {
  return Math.min(scale.max, Math.max(scale.min, value));
}

/** Fine and coarse ticks, as shares of the scale. */
export function scaleTicks(scale: Scale): { fine: number[]; coarse: number[] } {
  const coarse = ticks(scale.min, scale.max, 4);
  const fine = ticks(scale.min, scale.max, FINE_TICKS).filter((tick) => !coarse.some((each) => each === tick));
  const share = (tick: number) => shareOf(scale, tick);
  return { fine: fine.map(share), coarse: coarse.map(share) };
}

/** A number as it is written into the text: shortest decimal form, never more than 12 digits. */
export function sourceOf(value: number): string {
  return String(Number(value.toPrecision(12)));
}

/** True when a source is a plain number, so that it can be stepped and dragged. */
export function isPlainNumber(source: string): boolean {
  return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(source.trim());
}

/**
 * A parameter's value as the rule shows it: with the decimals of its step or of its own source, whichever are more,
 * thousands parted by thin spaces. "2" with step 0.05 is shown as 2.00. What a formula comes to has six digits.
 */
export function shownValue(value: number, source: string, step: number | null): string {
  const own = isPlainNumber(source) ? source : String(Number(value.toPrecision(FORMULA_DIGITS)));
  const decimals = Math.min(10, Math.max(decimalsOf(own), step === null ? 0 : decimalsOf(String(step))));
  const size = Math.abs(value);
  if (value !== 0 && (size >= 1e9 || size < 1e-5)) return sourceOf(value);
  const [whole = "", part] = value.toFixed(decimals).split(".");
  const parted = whole.replace(/\B(?=(\d{3})+(?!\d))/g, whole.replace("-", "").length > 4 ? "\u2009" : "");
  return (part === undefined ? parted : `${parted}.${part}`).replace("-", "−");
}

/** So many digits of what a formula comes to are shown. */
const FORMULA_DIGITS = 6;

function decimalsOf(source: string): number {
  if (!isPlainNumber(source)) return 0;
  const [digits = "", power = "0"] = source.trim().toLowerCase().split("e");
  return Math.max(0, (digits.split(".")[1]?.length ?? 0) - Number(power));
}

/**
 * A source to be written where a parameter's stands, inside YAML: quoted when YAML would cut it.
 * `flow` is true within `{ }` or `[ ]`, where commas and brackets would end it.
 */
export function yamlScalar(source: string): string {
  const plain = source.trim();
  const risky = /[,:#{}[\]&*!|>%@`"'\\]/.test(plain) && !/^[\w\s.+\-*/^()]+$/.test(plain);
  const leading = /^[*&!|>%@`\-?]\s?/.test(plain) && !isPlainNumber(plain);
  return risky || leading ? `"${plain.replace(/(["\\])/g, "\\$1")}"` : plain;
}
