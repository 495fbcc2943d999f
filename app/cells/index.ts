/** Cells: the plan of a paper, keys, the kinds of cell there are, results, and what becomes of them. */
export { canonicalJson, sha256 } from "./canonical.ts";
export { causesOf, causeWords } from "./causes.ts";
export type { ComputeHooks } from "./compute.ts";
export { computeCell, computePlan } from "./compute.ts";
export type { CallableDocumentation, KeyDocumentation, Kind, KindDocumentation } from "./kind.ts";
export type { EvaluatedNumber } from "./numbers.ts";
export { evaluateNumber, paperScope } from "./numbers.ts";
export { parameterWords } from "./parameter-values.ts";
export { planPaper } from "./plan.ts";
export { captionOf } from "./presentation.ts";
export type { Provenance } from "./provenance.ts";
export { durationWords, provenance } from "./provenance.ts";
export { KINDS } from "./registry.ts";
export type { Report, ReportedCell, ReportedNumber, ReportedProblem, ReportedValue } from "./report.ts";
export { reportPaper } from "./report.ts";
export { reportAsText } from "./report-text.ts";
export { cellState } from "./state.ts";
export type {
  Cause,
  CellFailure,
  CellResult,
  CellState,
  CellTask,
  CellView,
  CellWork,
  Outcome,
  ParameterChange,
  Plan,
  PlannedCell,
  PlannedParameter,
  ShownCell,
  ShownPaper,
} from "./types.ts";
export { viewCell } from "./view.ts";
