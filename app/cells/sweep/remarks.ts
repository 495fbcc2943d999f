import { labelText } from "../../figures/index.ts";
import type { Presentation } from "../presentation.ts";
import { shortNumber } from "../values.ts";
import type { SweepCurve, SweepData } from "./model.ts";

const MOST_GAPS = 4;

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
  return [...places].map(([why, where]) => `At ${where.join(", ")} ${why}`);
}

function gapRemarks(data: SweepData, presentation: Presentation): string[] {
  const gaps = data.record.flatMap((name) => data.curves.flatMap((curve) => gapsOf(data, curve, name, presentation)));
  const more = gaps.length - MOST_GAPS;
  return more > 0 ? [...gaps.slice(0, MOST_GAPS), `And ${more} more ${more === 1 ? "gap" : "gaps"}.`] : gaps;
}

/** Neighbouring points without a value for one reason are one gap. */
function gapsOf(data: SweepData, curve: SweepCurve, name: string, presentation: Presentation): string[] {
  const order = [...curve.x.keys()].sort((a, b) => (curve.x[a] ?? 0) - (curve.x[b] ?? 0));
  const gaps: { from: number; to: number; reason: string }[] = [];
  let open = false;
  for (const index of order) {
    const value = curve.recorded[index]?.[name];
    const x = curve.x[index] ?? Number.NaN;
    const last = gaps.at(-1);
    if (value?.type !== "refused") open = false;
    else if (open && last !== undefined && last.reason === value.reason) last.to = x;
    else {
      gaps.push({ from: x, to: x, reason: value.reason });
      open = true;
    }
  }
  const over = labelText(presentation.symbolOf(data.over));
  return gaps.map(({ from, to, reason }) => {
    const where =
      from === to ? `at ${over} = ${shortNumber(from)}` : `for ${over} from ${shortNumber(from)} to ${shortNumber(to)}`;
    return `No ${labelText(presentation.symbolOf(name))} ${where}${curveWords(data, curve, presentation)}: ${reason}`;
  });
}

function curveWords({ vary }: SweepData, { at }: SweepCurve, presentation: Presentation): string {
  return vary === null || at === null ? "" : ` (${labelText(presentation.symbolOf(vary))} = ${shortNumber(at)})`;
}
