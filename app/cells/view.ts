import { paperScope } from "./numbers.ts";
import { presentationOf } from "./presentation.ts";
import { KINDS } from "./registry.ts";
import type { CellResult, CellView, Plan, PlannedCell } from "./types.ts";

const NOTHING: CellView = { figure: null, table: null, points: null };

/**
 * What the page, the galley and the export make of a result: all parts the kind has, whatever `show` says. Its looks are
 * those of the body as it is now. `results` are not read by the kinds there are, whose results are whole in themselves.
 */
export function viewCell(
  planned: PlannedCell,
  result: CellResult,
  plan: Plan,
  _results: ReadonlyMap<string, CellResult>,
): CellView {
  const kind = KINDS.get(result.kind);
  if (kind === undefined || result.kind !== planned.kind) return NOTHING;
  const symbols = new Map(plan.parameters.map(({ name, symbol }) => [name, symbol]));
  return kind.view(result.data, presentationOf(planned.cell, paperScope(plan, new Map()), symbols));
}
