/** Figures: one description, from which the page's SVG, the print's pgfplots and the CSV are made. */
export { axisEnds } from "./axis-ends.ts";
export { type Crossing, crossings, levelCrossings } from "./crossings.ts";
export { figureToCsv, tableToCsv } from "./csv.ts";
export { FigureReading } from "./figure-reading.tsx";
export { isWords, type LabelRun, labelRuns, labelText } from "./label.ts";
export { figureWithoutMacros } from "./label-macros.ts";
export { type FigureLayout, layoutFigure, panelLetter } from "./layout.ts";
export type { Theme } from "./palette.ts";
export { figureToPgfplots, type PgfplotsFigure, type PgfplotsOptions } from "./pgfplots.ts";
export { FigurePlate, type FigurePlateProps } from "./plate.tsx";
export type { PlateSize } from "./plot-layout.ts";
export { type PointColumn, type PointGroup, pointGroups } from "./point-groups.ts";
export { type PlacedCurve, type PlacedPoint, type PlacedPoints, placePoints } from "./point-places.ts";
export { quoteOf } from "./quotes.ts";
export { type Curve, nearestPoint, type PointAsked, type ReadPoint } from "./readable-curves.ts";
export { thinBandRemark } from "./thin-bands.ts";
export type {
  Axis,
  Corner,
  CurveReadings,
  Dot,
  Figure,
  Inset,
  Level,
  Panel,
  Series,
  TableColumn,
  TableData,
  TableEntry,
  Vertical,
} from "./types.ts";
export { walkedTo } from "./walking.ts";
