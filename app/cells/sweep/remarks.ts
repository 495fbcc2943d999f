import { labelText } from "../../figures/index.ts";
import type { Presentation } from "../presentation.ts";
import { shortNumber } from "../values.ts";
import type { SweepCurve, SweepData } from "./model.ts";

const MOST_GAPS = 4;
const MOST_PLACES = 6;

/** What the caption has to say: where curves break and why, and where something is missing and why. */
export function sweepRemarks(data: SweepData, presentation: Presentation): readonly string[] {
  return [...jumpRemarks(data, presentation), ...gapRemarks(data, presentation)];
}

/** "At μ = 1.414 the drift is critical in larvae: below, K is infinite with positive probability; from there on, K is finite." */
function jumpRemarks(data: SweepData, presentation: Presentation): string[] {
  const over = labelText(presentation.symbolOf(data.over));
  const places = new Map<string, string[]>();
  for (const curve of data.curves) {
    for (const { above, open, words } of curve.jumps) {
      if (words === null) continue;
      const [up, down] = open === "below" ? ["from there on", "below"] : ["above", "up to there"];
      const why = `${words.at}: ${down}, ${words.below}; ${up}, ${words.above}. No curve is drawn across.`;
      const where = `${over} = ${shortNumber(above)}${curveWords(data, curve, presentation)}`;
      places.set(why, [...(places.get(why) ?? []), where]);
    }
  }
  return [...places].map(([why, where]) => `At ${listed(where)} ${why}`);
}

/** "No λ for μ from 1 to 1.414 (β = 1) and from 1 to 2 (β = 2): …", one sentence for each quantity and reason. */
function gapRemarks(data: SweepData, presentation: Presentation): string[] {
  const over = labelText(presentation.symbolOf(data.over));
  const remarks = data.record.flatMap((name) => {
    const places = new Map<string, string[]>();
    for (const curve of data.curves) {
      const which = curveWords(data, curve, presentation);
      for (const { from, to, reason } of gapsOf(curve, name)) {
        const where = from === to ? `at ${shortNumber(from)}` : `from ${shortNumber(from)} to ${shortNumber(to)}`;
        places.set(reason, [...(places.get(reason) ?? []), `${where}${which}`]);
      }
    }
    const told = labelText(presentation.symbolOf(name));
    return [...places].map(([reason, where]) => `No ${told} for ${over} ${listed(where)}: ${reason}`);
  });
  const more = remarks.length - MOST_GAPS;
  return more > 0
    ? [...remarks.slice(0, MOST_GAPS), `And ${more} more ${more === 1 ? "kind of gap" : "kinds of gap"}.`]
    : remarks;
}

interface Gap {
  readonly from: number;
  readonly to: number;
  readonly reason: string;
}

/** Neighbouring points without a value for one reason are one gap; the reason is said of its first point. */
function gapsOf(curve: SweepCurve, name: string): Gap[] {
  const order = [...curve.x.keys()].sort((a, b) => (curve.x[a] ?? 0) - (curve.x[b] ?? 0));
  const gaps: Gap[] = [];
  let isOpen = false;
  for (const index of order) {
    const value = curve.recorded[index]?.[name];
    const x = curve.x[index] ?? Number.NaN;
    const last = gaps.at(-1);
    if (value?.type !== "refused") isOpen = false;
    else if (isOpen && last !== undefined && isAlike(last.reason, value.reason))
      gaps[gaps.length - 1] = { ...last, to: x };
    else {
      gaps.push({ from: x, to: x, reason: value.reason });
      isOpen = true;
    }
  }
  return gaps;
}

/** Whether two reasons differ at most in their numbers. */
function isAlike(a: string, b: string): boolean {
  const withoutNumbers = (reason: string) => reason.replace(/[−-]?\d[\d.]*(?:e[+-]?\d+)?/g, "#");
  return a === b || withoutNumbers(a) === withoutNumbers(b);
}

function listed(parts: readonly string[]): string {
  const shown =
    parts.length > MOST_PLACES ? [...parts.slice(0, MOST_PLACES), `${parts.length - MOST_PLACES} more`] : parts;
  return shown.length < 2 ? (shown[0] ?? "") : `${shown.slice(0, -1).join(", ")} and ${shown.at(-1)}`;
}

function curveWords({ vary }: SweepData, { at }: SweepCurve, presentation: Presentation): string {
  return vary === null || at === null ? "" : ` (${labelText(presentation.symbolOf(vary))} = ${shortNumber(at)})`;
}
