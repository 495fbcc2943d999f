import { ticks as niceTicks, tickStep } from "d3-array";
import type { LabelRun } from "./label.ts";

/** A tick in plotted coordinates: on a log axis `at` is log10 of the value. */
export interface Tick {
  readonly at: number;
  readonly runs: readonly LabelRun[];
  /** The same as TeX, for print. */
  readonly tex: string;
}

const upright = (text: string, shift: LabelRun["shift"] = "base"): LabelRun => ({ text, style: "upright", shift });

/** Beyond these a linear axis writes its numbers with a power of ten. */
const LARGEST_PLAIN = 1e6;
const SMALLEST_PLAIN = 1e-4;

/**
 * Ticks at 1, 2 or 5 times a power of ten.
 * @param low @param high ends of the axis, low < high
 * @param wanted about how many
 */
export function linearTicks(low: number, high: number, wanted: number): readonly Tick[] {
  const step = tickStep(low, high, wanted);
  const largest = Math.max(Math.abs(low), Math.abs(high));
  if (largest >= LARGEST_PLAIN || largest < SMALLEST_PLAIN) return poweredTicks(low, high, wanted, step, largest);
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  return niceTicks(low, high, wanted).map((at) => numberTick(at, plainNumber(at, decimals)));
}

/** All ticks share one power of ten, so that they can be compared at a glance. */
function poweredTicks(low: number, high: number, wanted: number, step: number, largest: number): readonly Tick[] {
  const power = Math.floor(Math.log10(largest));
  const decimals = Math.max(0, power - Math.floor(Math.log10(step) + 1e-9));
  return niceTicks(low, high, wanted).map((at) => {
    if (at === 0) return numberTick(0, "0");
    const mantissa = plainNumber(at / 10 ** power, decimals);
    return {
      at,
      runs: [upright(`${mantissa}×10`), upright(signed(power), "sup")],
      tex: `${texNumber(mantissa)}\\times10^{${power}}`,
    };
  });
}

/**
 * Ticks of a logarithmic axis, at powers of ten; between them at 2 and 5 where the axis is short.
 * @param low @param high ends of the axis as log10 of the values: any finite numbers, so 10^-741 is an ordinary end
 * @param wanted about how many
 */
export function logTicks(low: number, high: number, wanted: number): readonly Tick[] {
  const first = Math.ceil(low - 1e-9);
  const last = Math.floor(high + 1e-9);
  if (last - first < 1) return shortLogTicks(low, high, wanted);
  const step = Math.max(1, tickStep(first, last, wanted));
  const found: Tick[] = [];
  for (let exponent = Math.ceil(first / step) * step; exponent <= last; exponent += step)
    found.push(powerTick(exponent));
  if (step === 1 && found.length <= 2) return withHalves(found, low, high);
  return found;
}

function withHalves(powers: readonly Tick[], low: number, high: number): readonly Tick[] {
  const halves: Tick[] = [];
  for (let exponent = Math.floor(low); exponent <= high; exponent += 1) {
    for (const factor of [2, 5]) {
      const at = exponent + Math.log10(factor);
      if (at > low && at < high) halves.push(factorTick(factor, exponent));
    }
  }
  return [...powers, ...halves].sort((a, b) => a.at - b.at);
}

/** Less than a decade: ticks of the values themselves. */
function shortLogTicks(low: number, high: number, wanted: number): readonly Tick[] {
  const power = Math.floor(low);
  const from = 10 ** (low - power);
  const to = 10 ** (high - power);
  return linearTicks(from, to, wanted)
    .filter((tick) => tick.at > 0)
    .map((tick) => {
      const at = Math.log10(tick.at) + power;
      if (Math.abs(power) > 3)
        return {
          at,
          runs: [...tick.runs, upright("×10"), upright(signed(power), "sup")],
          tex: `${tick.tex}\\times10^{${power}}`,
        };
      const step = tickStep(from, to, wanted) * 10 ** power;
      return numberTick(at, plainNumber(10 ** at, Math.max(0, -Math.floor(Math.log10(step) + 1e-9))));
    });
}

function factorTick(factor: number, exponent: number): Tick {
  const at = exponent + Math.log10(factor);
  if (Math.abs(exponent) <= 2) return numberTick(at, plainNumber(factor * 10 ** exponent, Math.max(0, -exponent)));
  return {
    at,
    runs: [upright(`${factor}×10`), upright(signed(exponent), "sup")],
    tex: `${factor}\\times10^{${exponent}}`,
  };
}

function powerTick(exponent: number): Tick {
  if (exponent === 0) return numberTick(0, "1");
  if (exponent === 1) return numberTick(1, "10");
  return { at: exponent, runs: [upright("10"), upright(signed(exponent), "sup")], tex: `10^{${exponent}}` };
}

function numberTick(at: number, text: string): Tick {
  return { at, runs: [upright(text)], tex: texNumber(text) };
}

/** Thousands are parted by a thin space from five digits on; the minus is a minus. */
function plainNumber(value: number, decimals: number): string {
  if (Math.abs(value) < 0.5 * 10 ** -decimals) return "0";
  const [whole = "", part] = Math.abs(value).toFixed(decimals).split(".");
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, "\u2009") : whole;
  const text = part === undefined ? grouped : `${grouped}.${part}`;
  return value < 0 && Number(value.toFixed(decimals)) !== 0 ? `−${text}` : text;
}

const signed = (integer: number) => (integer < 0 ? `−${-integer}` : String(integer));
const texNumber = (text: string) => text.replace("−", "-").replaceAll("\u2009", "\\,");
