import { Command, TailLine } from "../../ui/index.ts";
import { goToErratum } from "../keys/errata-walk.ts";
import type { Desk, DeskView } from "../live/desk.ts";
import { TO_RECOMPUTE } from "../live/desk-view.ts";
import type { CellFace, Erratum, SheetModel } from "../model/types.ts";
import { StrandsCommands } from "../strands/strands-commands.tsx";
import type { StrandWatch } from "../strands/watch.ts";
import { useDeskView } from "./use-desk-view.ts";
import { clock, counted, listed } from "./words.ts";

interface Props {
  readonly desk: Desk;
  readonly writes: boolean;
  readonly strands: StrandWatch | null;
}

/** The tail line: what is kept, what is out of date or failed, and what was refused. */
export function SheetTail({ desk, writes, strands }: Props) {
  return (
    <TailLine
      left={<KeptWords desk={desk} writes={writes} />}
      middle={<Errata desk={desk} writes={writes} />}
      right={
        <>
          <Notice desk={desk} />
          {strands === null ? null : <StrandsCommands desk={desk} watch={strands} />}
        </>
      }
    />
  );
}

function KeptWords({ desk, writes }: Pick<Props, "desk" | "writes">) {
  return <span className="hl-kept">{useDeskView(desk, (view) => keptWords(view, writes))}</span>;
}

function Notice({ desk }: Pick<Props, "desk">) {
  const notice = useDeskView(desk, (view) => view.notice);
  if (notice === null) return null;
  const { words, amiss, offer } = notice;
  return (
    <span className={amiss ? "hl-amiss" : ""}>
      {words} {offer === undefined ? null : <Command onClick={offer.act}>{offer.name}</Command>}{" "}
    </span>
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

function Errata({ desk, writes }: Pick<Props, "desk" | "writes">) {
  // As words: where the errata stand moves with each keystroke above them, and what is said of them does not.
  const told = useDeskView(desk, ({ model }) => (model === null ? "" : toldOf(model)));
  if (told === "") return null;
  const { count, words, working, due }: Told = JSON.parse(told);
  if (count === 0 && working === 0 && !due) return <span>Errata none</span>;
  const next = () => {
    if (desk.view !== null) goToErratum({ desk, view: desk.view }, 1);
  };
  return (
    <span className="hl-errata">
      {count === 0 ? null : (
        <button type="button" className="hl-errata-count" onClick={next} title="Go to the next">
          Errata {count}
        </button>
      )}
      <span className="hl-errata-words">{words}</span>
      {working > 0 ? <span>{counted(working, "cell")} being computed</span> : null}
      {writes && working > 0 ? (
        <Command className="hl-cancel-all" onClick={() => desk.cancelAll()}>
          Cancel
        </Command>
      ) : null}
      {writes && due ? <Command onClick={() => desk.recomputeAll()}>Recompute all</Command> : null}
    </span>
  );
}

interface Told {
  readonly count: number;
  readonly words: string;
  /** Cells under way. */
  readonly working: number;
  /** Something can be recomputed. */
  readonly due: boolean;
}

function toldOf({ errata, cells }: SheetModel): string {
  const told: Told = {
    count: errata.length,
    words: errataWords(errata),
    working: cells.filter((cell) => isUnderWay(cell, cells)).length,
    due: cells.some((cell) => cell.sound && TO_RECOMPUTE.has(cell.state)),
  };
  return JSON.stringify(told);
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
