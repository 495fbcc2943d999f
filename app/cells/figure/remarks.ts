import { labelText } from "../../figures/index.ts";
import type { Value } from "../../formulas/index.ts";
import type { DrawnView, Presentation } from "../presentation.ts";
import { sweepRemarks } from "../sweep/remarks.ts";
import { shortNumber } from "../values.ts";
import { isPlace, labelOf } from "./labels.ts";
import type { FigureData } from "./model.ts";

/** What the caption has to say: jumps and gaps and why, what was left out, what bands and bars are. */
export function figureRemarks(
  data: FigureData,
  cells: readonly DrawnView[],
  presentation: Presentation,
): readonly string[] {
  const named: Presentation = { ...presentation, symbolOf: (name) => nameIn(data, name, presentation) };
  return [
    ...data.samples.flatMap((sample) => sweepRemarks(sample.data, named)),
    ...thinnedRemarks(data, presentation),
    ...levelRemarks(data, presentation),
    ...chanceRemarks(data),
    ...new Set(cells.flatMap(({ figure }) => figure?.remarks ?? [])),
  ];
}

/** The variable as a symbol, a curve as it is labelled, an end of a band as it stands. */
function nameIn(data: FigureData, name: string, presentation: Presentation): string {
  if (name === data.over) return presentation.symbolOf(name);
  return name.includes(" ") ? name : labelOf(name, presentation);
}

function thinnedRemarks({ samples, over }: FigureData, presentation: Presentation): string[] {
  return samples.flatMap(({ data, thinnedFrom }) => {
    const x = data.curves[0]?.x ?? [];
    const [first, last] = [x[0], x.at(-1)];
    if (thinnedFrom === null || first === undefined || last === undefined) return [];
    const name = labelText(presentation.symbolOf(over ?? ""));
    return [`Of ${name} = ${shortNumber(first)} to ${shortNumber(last)}, ${x.length} are drawn.`];
  });
}

function levelRemarks({ levels }: FigureData, presentation: Presentation): string[] {
  return Object.entries(levels).flatMap(([name, value]) => {
    const what = isPlace(name) ? `level ${Number(name) + 1}` : `level ${labelText(labelOf(name, presentation))}`;
    return value.type === "refused" ? [`No ${what}: ${value.reason}`] : [];
  });
}

/** Where chance enters, and the author gives no band, bands and bars are 95 % intervals of a normal estimate. */
function chanceRemarks({ samples, bands }: FigureData): string[] {
  const hasChance = (value: Value | undefined): boolean => value?.type === "number" && value.quantity.se > 0;
  const names = samples.flatMap(({ data }) =>
    data.record.filter((name) => data.curves.some(({ recorded }) => recorded.some((all) => hasChance(all[name])))),
  );
  const own = names.filter((name) => !name.includes(" ") && !bands.includes(name));
  return own.length === 0 ? [] : ["Bands and bars are 1.96 standard errors."];
}
