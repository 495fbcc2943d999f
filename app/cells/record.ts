import type { TableData } from "../figures/index.ts";
import type { ReportedValue } from "./report.ts";
import { reportedValue } from "./report.ts";
import type { CellResult, CellView, PlannedCell } from "./types.ts";

/** One cell's result as it is taken away as JSON: what it was computed from, by what, and all that it gives. */
export interface CellRecord {
  readonly cell: string;
  readonly kind: string;
  /** SHA-256 of all that enters the computation; an equal key means an equal result. */
  readonly key: string;
  readonly solver: string;
  readonly method: string;
  readonly seconds: number;
  /** Parameters that entered, as the paper writes them. */
  readonly parameters: Readonly<Record<string, string>>;
  readonly values: Readonly<Record<string, ReportedValue>>;
  readonly table: readonly RecordedRow[] | null;
  readonly points: readonly RecordedRow[] | null;
}

/** By column. Numbers as decimal text, since some lie beyond the range of doubles; null where there is none. */
type RecordedRow = Readonly<Record<string, string | null>>;

/** @param parameters those the shown result was computed with, which may be older than the plan's */
export function cellRecord(
  planned: PlannedCell,
  result: CellResult,
  view: CellView,
  parameters: Readonly<Record<string, string>>,
): CellRecord {
  return {
    cell: planned.id,
    kind: result.kind,
    key: result.key,
    solver: result.solver,
    method: result.method,
    seconds: result.seconds,
    parameters,
    values: Object.fromEntries(Object.entries(result.values).map(([name, value]) => [name, reportedValue(value)])),
    table: view.table === null ? null : recordedRows(view.table),
    points: view.points === null ? null : recordedRows(view.points),
  };
}

function recordedRows(table: TableData): RecordedRow[] {
  return table.rows.map((row) =>
    Object.fromEntries(
      table.columns.flatMap(({ name }, k) => {
        const entry = row[k];
        const error = entry?.error ?? "";
        return [[name, entry?.full || null], ...(error === "" ? [] : [[`${name} error`, error]])];
      }),
    ),
  );
}
