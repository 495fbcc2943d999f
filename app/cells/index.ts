/** Cells: the plan of a paper, keys, the kinds of cell there are, results, and what becomes of them. */
export type { AnswerBorder, AnswerRange } from "./answer-range.ts";
export { answerRange, answerRangeSteps } from "./answer-range.ts";
export type { AxesSaid, AxisSaid } from "./axes-editing.ts";
export { axesEdits, axesSaid, NO_AXES_SAID } from "./axes-editing.ts";
export { canonicalJson, sha256 } from "./canonical.ts";
export { causeWords } from "./causes.ts";
export type { ComputeHooks } from "./compute.ts";
export { computeCell, computePlan, quickCells } from "./compute.ts";
export type { KeyDocumentation, KindDocumentation } from "./kind.ts";
export { evaluateNumber, paperScope } from "./numbers.ts";
export { parameterWords } from "./parameter-values.ts";
export { addsParameter, nameFault } from "./parameters-editing/add.ts";
export type { FieldChanges, ParameterEdit } from "./parameters-editing/change.ts";
export { changesParameter } from "./parameters-editing/change.ts";
export type { ParameterField, ParameterFields } from "./parameters-editing/entry.ts";
export { PARAMETER_FIELDS, parameterFields } from "./parameters-editing/entry.ts";
export type { ParameterProblem } from "./parameters-editing/judge.ts";
export { movesParameter } from "./parameters-editing/move.ts";
export type { StillRead } from "./parameters-editing/remove.ts";
export { removesParameter } from "./parameters-editing/remove.ts";
export type { CellPart, SplitCell } from "./parts.ts";
export { beginCell, computePart, mergeParts } from "./parts.ts";
export { planPaper } from "./plan.ts";
export { axisEnd, captionOf, PRESENTATION_KEYS } from "./presentation.ts";
export type { Provenance } from "./provenance.ts";
export { durationWords, provenance } from "./provenance.ts";
export { figureReadings } from "./readings.ts";
export type { CellRecord } from "./record.ts";
export { cellRecord } from "./record.ts";
export { KINDS } from "./registry.ts";
export type { NoRenaming, Renaming } from "./renaming/rename.ts";
export { nameAt, renames } from "./renaming/rename.ts";
export type { Report, ReportedCell, ReportedValue } from "./report.ts";
export { reportPaper } from "./report.ts";
export { reportAsText } from "./report-text.ts";
export { cellState } from "./state.ts";
export { pointsTable } from "./table-parts.ts";
export type {
  Cause,
  CellResult,
  CellState,
  CellTask,
  CellView,
  CellWork,
  Finding,
  Outcome,
  ParameterChange,
  Plan,
  PlannedCell,
  ShownCell,
  ShownPaper,
} from "./types.ts";
export { costWords } from "./varying.ts";
export { findingOf, viewCell } from "./view.ts";
