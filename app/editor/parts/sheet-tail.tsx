import { useRef } from "react";
import { Command, TailLine } from "../../ui/index.ts";
import type { Desk, DeskView } from "../live/desk.ts";
import type { CellFace, Erratum, SheetModel } from "../model/types.ts";
import { clock, counted, listed } from "./words.ts";

interface Props {
  readonly desk: Desk;
  readonly view: DeskView;
  readonly writes: boolean;
}

/** The tail line: what is kept, what is out of date or failed, and what was refused. */
export function SheetTail({ desk, view, writes }: Props) {
  const { model, notice } = view;
  return (
    <TailLine
      left={<span className="hl-kept">{keptWords(view, writes)}</span>}
      middle={model === null ? null : <Errata desk={desk} model={model} writes={writes} />}
      right={notice === null ? null : <span className={notice.amiss ? "hl-amiss" : ""}>{notice.words}</span>}
    />
  );
}

/** "All changes kept, 14:32": said only when the server has committed all that was written here. */
export function keptWords(
  { connection, kept, ready }: Pick<DeskView, "connection" | "kept" | "ready">,
  writes: boolean,
): string {
  if (connection.state === "away") {
    const since = `No connection since ${clock(connection.since)}.`;
    return writes ? `${since} Your words are kept on this machine; recomputing waits.` : since;
  }
  if (connection.state === "closed") return "Not joined";
  if (connection.state === "still") return "Nothing is kept";
  if (connection.state === "joining" || !ready) return "Joining";
  if (!writes) return "To read";
  if (!kept.all) return "Keeping";
  return kept.at === null ? "All changes kept" : `All changes kept, ${clock(kept.at)}`;
}

function Errata({
  desk,
  model,
  writes,
}: {
  readonly desk: Desk;
  readonly model: SheetModel;
  readonly writes: boolean;
}) {
  const last = useRef(-1);
  const { errata, cells } = model;
  const working = cells.filter((cell) => isUnderWay(cell, cells)).length;
  const due = cells.some((cell) => cell.sound && RECOMPUTED.has(cell.state));
  if (errata.length === 0 && working === 0 && !due) return <span>Errata none</span>;
  const next = () => {
    const found = errata.find(({ from }) => from > last.current) ?? errata[0];
    if (found === undefined) return;
    last.current = found.from;
    // A plate is shown as it stands; in a sentence the caret goes to what is amiss.
    if (found.what === "cell") desk.show(found.from);
    else desk.goTo(found.from);
  };
  return (
    <span className="hl-errata">
      {errata.length === 0 ? null : (
        <button type="button" className="hl-errata-count" onClick={next} title="Go to the next">
          Errata {errata.length}
        </button>
      )}
      <span className="hl-errata-words">{errataWords(errata)}</span>
      {working > 0 ? <span>{counted(working, "cell")} being computed</span> : null}
      {writes && working > 0 ? <Command onClick={() => desk.cancelAll()}>Cancel</Command> : null}
      {writes && due ? <Command onClick={() => desk.recomputeAll()}>Recompute all</Command> : null}
    </span>
  );
}

/** Being computed, or in the queue behind what is. A cell that waits for a failed one waits for a person. */
export function isUnderWay(cell: CellFace, cells: readonly CellFace[]): boolean {
  if (cell.state === "computing") return true;
  if (cell.state !== "waiting") return false;
  const needed = cell.needs === null ? undefined : cells.find(({ slot }) => slot === cell.needs?.slot);
  return (
    needed === undefined || (needed.state !== "failed" && (needed.state !== "waiting" || isUnderWay(needed, cells)))
  );
}

const RECOMPUTED: ReadonlySet<string> = new Set(["outOfDate", "cancelled", "empty", "failed"]);

/** "Table 1 and 2 numbers in line 41 are out of date". */
export function errataWords(errata: readonly Erratum[]): string {
  const stale = errata.filter(({ mark }) => mark === "†");
  const failed = errata.filter(({ mark }) => mark === "‡");
  const sentences = [
    ...(stale.length === 0 ? [] : [`${things(stale)} ${stale.length === 1 ? "is" : "are"} out of date`]),
    ...(failed.length === 0 ? [] : [`${things(failed)} to be mended`]),
  ];
  return sentences.join("; ");
}

/** How many cells are named one by one. */
const NAMED = 3;

function things(errata: readonly Erratum[]): string {
  const cells = [...new Set(errata.filter(({ what }) => what === "cell").map(({ title }) => title))];
  const numbers = errata.filter(({ what }) => what === "number");
  const problems = errata.filter(({ what }) => what === "problem");
  const lines = [...new Set(numbers.map(({ line }) => line))];
  const where = lines.length === 1 ? ` in line ${lines[0]}` : "";
  return listed([
    ...(cells.length > NAMED ? [counted(cells.length, "cell")] : cells),
    ...(numbers.length === 0 ? [] : [`${counted(numbers.length, "number")}${where}`]),
    ...(problems.length === 0
      ? []
      : problems.length === 1
        ? [`line ${problems[0]?.line}`]
        : [counted(problems.length, "line")]),
  ]);
}
