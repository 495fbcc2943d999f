import { labelText, type TableColumn, type TableData } from "../../figures/index.ts";
import { NumberText } from "../../ui/index.ts";
import { Runs } from "./runs.tsx";

interface TablePlateProps {
  readonly table: TableData;
  readonly macros: Readonly<Record<string, string>>;
}

/** A table of results: rules above, below and under the head, numbers to the right, unsupported digits grey. */
export function TablePlate({ table, macros }: TablePlateProps) {
  return (
    <section className="paper-grid" aria-label="Table" ref={reachable}>
      <table className="paper-table paper-results">
        <thead>
          <tr>
            {table.columns.map((column) => (
              <th key={column.name} scope="col">
                <Head column={column} macros={macros} />
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {table.rows.map((row, at) => (
            <tr key={row[0]?.full ?? at}>
              {row.map((entry, column) => (
                <td key={table.columns[column]?.name ?? column}>
                  <NumberText text={entry.text} />
                  {entry.unsupported === "" ? null : <span className="hl-unknown">{entry.unsupported}</span>}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

/** A wide table scrolls by itself; Tab reaches it, so that the arrows can move it. */
function reachable(place: HTMLElement | null): void {
  if (place !== null) place.tabIndex = 0;
}

/** A head that is a formula is also said in words, since a head of MathML alone is silent to some readers. */
function Head({ column, macros }: { readonly column: TableColumn } & Pick<TablePlateProps, "macros">) {
  if (!column.tex) return column.head;
  return (
    <>
      <span className="hl-said">{labelText(column.head)}</span>
      <span aria-hidden="true">
        <Runs runs={[{ run: "math", tex: column.head }]} macros={macros} />
      </span>
    </>
  );
}
