import { type CurveReadings, type Figure, labelText, panelLetter, pointGroups, type Series } from "../figures/index.ts";
import { pointsTable } from "./table-parts.ts";

/** Readings of every curve, in the order in which a plate places them: an inset after its figure, panels in turn. */
export function figureReadings(figure: Figure, prefix = ""): CurveReadings[] {
  if (figure.panels?.length)
    return figure.panels.flatMap((panel, k) => figureReadings(panel.figure, `${prefix}${panelLetter(k)} `));
  const own = readingsOf(figure).map((one) => ({ ...one, name: `${prefix}${one.name}` }));
  return figure.inset ? [...own, ...figureReadings(figure.inset.figure, `${prefix}inset `)] : own;
}

function readingsOf(figure: Figure): CurveReadings[] {
  const alone: Figure = { ...figure, inset: undefined, panels: undefined };
  const table = pointsTable("x", alone);
  const texts = new Map<Series, string[]>();
  let column = 0;
  for (const { x, columns } of pointGroups(alone)) {
    const abscissa = column;
    column += 1;
    for (const { series, at } of columns) {
      const own: string[] = series.x.map(() => "");
      x.forEach((_, row) => {
        const i = at[row] ?? null;
        const [across, up] = [table.rows[row]?.[abscissa]?.text ?? "", table.rows[row]?.[column]?.text ?? ""];
        if (i !== null && up !== "")
          own[i] = `${nameOf(figure.x.label, "x")} = ${across}, ${upName(figure, series)} = ${up}`;
      });
      texts.set(series, own);
      column += series.mark === "band" ? 2 : 1;
    }
  }
  return figure.series.map((series) => ({ name: series.name, texts: texts.get(series) ?? [] }));
}

/** The axis' own name, else the curve's. */
const upName = (figure: Figure, series: Series) => nameOf(figure.y.label, series.name);
const nameOf = (label: string, otherwise: string) => labelText(label) || otherwise;
