import { type Figure, FigurePlate, labelText, type TableData } from "../figures/index.ts";
import type { CellNode, PrintedPart } from "../paper/index.ts";
import { cellTitle, provenanceParts, type SetCell } from "../print/index.ts";
import { NumberText } from "../ui/index.ts";
import { Formula, Inline, Words } from "./inline.tsx";
import { anchor, type Setting } from "./setting.ts";

/** Widths a plate is laid out for: text in it keeps its size, so a narrow window gets a plate of its own. */
const WIDE = 500;
const NARROW = 350;

/** What a cell prints, and what its result says of itself where that needs attention. */
export function CellParts({ node, setting }: { readonly node: CellNode; readonly setting: Setting }) {
  const set = setting.set.cell(node.cell);
  return (
    <>
      <Parts node={node} set={set} setting={setting} />
      {set.finding?.isGrave === true ? (
        <p className="g-finding">
          <span className="g-dagger">‡</span> {`${cellTitle(set)}: ${set.finding.words}`}
        </p>
      ) : null}
    </>
  );
}

interface PartsProps {
  readonly node: CellNode;
  readonly set: SetCell;
  readonly setting: Setting;
}

/** A figure above its caption, tables beneath theirs. Nothing for a cell that prints nothing. */
function Parts({ node, set, setting }: PartsProps) {
  return node.parts.map((part, i) => {
    const id = i === 0 && node.cell.name !== null ? anchor.label(node.cell.name) : undefined;
    const caption = <Caption node={node} part={part} set={set} first={i === 0} setting={setting} />;
    if (part.part === "figure") {
      return (
        <figure key={part.part} className="g-figure" id={id}>
          {set.view?.figure ? <Plates figure={set.view.figure} /> : <Absent part={part} set={set} />}
          <figcaption>{caption}</figcaption>
        </figure>
      );
    }
    const table = part.part === "points" ? set.view?.points : set.view?.table;
    return (
      <figure key={part.part} className="g-figure" id={id}>
        <figcaption>{caption}</figcaption>
        {table ? (
          <ResultTable name={`${part.noun} ${part.number}`} table={table} setting={setting} />
        ) : (
          <Absent part={part} set={set} />
        )}
      </figure>
    );
  });
}

function Plates({ figure }: { readonly figure: Figure }) {
  return (
    <>
      <div className="g-plate-wide">
        <FigurePlate figure={figure} width={WIDE} />
      </div>
      <div className="g-plate-narrow">
        <FigurePlate figure={figure} width={NARROW} />
      </div>
    </>
  );
}

function Absent({ part, set }: { readonly part: PrintedPart; readonly set: SetCell }) {
  return (
    <p className="g-absent">
      <span className="g-dagger">‡</span> {`${part.noun} ${part.number} has no result. ${set.reason}`}
    </p>
  );
}

interface CaptionProps {
  readonly node: CellNode;
  readonly part: PrintedPart;
  readonly set: SetCell;
  readonly first: boolean;
  readonly setting: Setting;
}

export function Caption({ node, part, set, first, setting }: CaptionProps) {
  const remarks = (part.part === "figure" ? set.view?.figure?.remarks : set.view?.table?.remarks) ?? [];
  return (
    <>
      <p className="g-caption">
        <b>{`${part.noun} ${part.number}.`}</b>
        {set.note ? <sup className="g-dagger">†</sup> : null}{" "}
        {first ? <Inline nodes={node.caption} setting={setting} /> : null}
        {remarks.map((remark) => (
          <span key={remark}>
            {" "}
            <Words words={remark} setting={setting} />
          </span>
        ))}
      </p>
      {set.note ? (
        <p className="g-provenance">
          <span className="g-dagger">† Out of date.</span> <Words words={set.note.words} setting={setting} />
        </p>
      ) : null}
      {first ? <ProvenanceLine set={set} /> : null}
    </>
  );
}

/** The moment stands in UTC; a page writes it in the reader's own time (`useLocalTimes`). */
function ProvenanceLine({ set }: { readonly set: SetCell }) {
  const { before, moment } = provenanceParts(set);
  if (before === "") return null;
  return (
    <p className="g-provenance">
      {before}
      {moment === null ? null : (
        <time dateTime={moment.iso} data-local="">
          {moment.words}
        </time>
      )}
    </p>
  );
}

/** A wide table scrolls by itself; Tab reaches it, so that the arrows can move it. */
const reachable = { tabIndex: 0 };

interface ResultTableProps {
  readonly name: string;
  readonly table: TableData;
  readonly setting: Setting;
}

export function ResultTable({ name, table, setting }: ResultTableProps) {
  return (
    <section className="paper-grid" aria-label={name} {...reachable}>
      <table className="paper-table paper-results">
        <thead>
          <tr>
            {table.columns.map((column) => (
              <th key={column.name} scope="col">
                {column.tex ? <FormulaHead tex={column.head} setting={setting} /> : column.head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {table.rows.map((row, i) => (
            <tr key={row[0]?.full || i}>
              {row.map((entry, k) => (
                <td key={table.columns[k]?.name ?? k}>
                  <NumberText text={entry.text} />
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

/** A head that is a formula is also said in words, since a head of MathML alone is silent to some readers. */
function FormulaHead({ tex, setting }: { readonly tex: string; readonly setting: Setting }) {
  return (
    <>
      <span className="sr-only">{labelText(tex)}</span>
      <span aria-hidden="true">
        <Formula tex={tex} setting={setting} />
      </span>
    </>
  );
}
