import { figureWithoutMacros, thinBandRemark } from "../figures/index.ts";
import type { Cell } from "../paper/index.ts";
import { paperScope } from "./numbers.ts";
import type { DrawnView, Presentation } from "./presentation.ts";
import { NOTHING_DRAWN, presentationOf } from "./presentation.ts";
import { KINDS } from "./registry.ts";
import type { CellResult, CellView, Finding, Plan, PlannedCell } from "./types.ts";

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
  return withThinBandsSaid(labelled(kind.view(result.data, looksOf(planned.cell, plan)), plan));
}

/** The paper's own macros are unfolded in labels, which are read by a small part of TeX that knows none. */
function labelled(view: CellView, { macros }: Plan): CellView {
  const figure = view.figure && figureWithoutMacros(view.figure, macros);
  return figure === view.figure ? view : { ...view, figure };
}

/** A band that is too thin to be drawn is said in the caption. */
function withThinBandsSaid(view: CellView): CellView {
  const remark = view.figure && thinBandRemark(view.figure);
  return view.figure && remark
    ? { ...view, figure: { ...view.figure, remarks: [...view.figure.remarks, remark] } }
    : view;
}

/** What a result says where its cell stands, a check that fails say; null for nothing. */
export function findingOf(planned: PlannedCell, result: CellResult, plan: Plan): Finding | null {
  const kind = KINDS.get(result.kind);
  if (kind?.finding === undefined || result.kind !== planned.kind) return null;
  return kind.finding(result.data, looksOf(planned.cell, plan));
}

function looksOf(cell: Pick<Cell, "name" | "body">, plan: Plan): Presentation {
  const symbols = new Map(plan.parameters.map(({ name, symbol }) => [name, symbol]));
  return presentationOf(cell, paperScope(plan, new Map()), symbols, (id, kind, data) =>
    drawnView(id, kind, data, plan),
  );
}

/** Another cell's data with the looks of that cell; without any where it is no longer a cell of that kind. */
function drawnView(id: string, kindName: string, data: unknown, plan: Plan): DrawnView {
  const kind = KINDS.get(kindName);
  if (kind === undefined) return NOTHING_DRAWN;
  const planned = plan.byId.get(id);
  const looks = looksOf(planned?.kind === kindName ? planned.cell : { name: id, body: null }, plan);
  const { figure } = kind.view(data, looks);
  const own = kind.drawn?.(data, looks);
  return own === undefined
    ? { figure, series: figure?.series ?? [], axes: figure }
    : { figure, series: own, axes: null };
}
