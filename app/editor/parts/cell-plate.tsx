import { memo, type ReactNode } from "react";
import type { CellView } from "../../cells/index.ts";
import type { CellFace } from "../model/types.ts";
import { FigureCommands } from "../plates/figure-commands.tsx";
import { SheetFigure } from "../plates/sheet-figure.tsx";
import type { SheetHost } from "../text/host.ts";
import { Runs } from "./runs.tsx";
import { StateLine } from "./state-line.tsx";
import { TablePlate } from "./table-plate.tsx";

interface Props {
  readonly face: CellFace;
  readonly view: CellView | null;
  readonly open: boolean;
  readonly host: SheetHost;
}

const Rows = memo(TablePlate);

/** A cell as it stands on the sheet: what it prints, its caption, and how it came to be. */
export function CellPlate({ face, view, open, host }: Props) {
  const [first, ...others] = face.parts;
  if (first === undefined) {
    return (
      <div className="hl-silent">
        <span className="hl-silent-name">{face.title}</span> <StateLine face={face} open={open} host={host} />
      </div>
    );
  }
  return (
    <section className={`hl-plate hl-plate-${face.state}`} aria-label={`${first.title}, ${STATE_WORDS[face.state]}`}>
      <Part part={first.part} view={view} face={face} host={host}>
        <p className="hl-caption">
          <b>{first.title}.</b>
          {MARKED[face.state] ? <span className="hl-dagger">{MARKED[face.state]}</span> : null}{" "}
          <Runs runs={face.caption} macros={host.macros} />
        </p>
        <StateLine face={face} open={open} host={host} />
      </Part>
      {others.map(({ part, title }) => (
        <Part key={part} part={part} view={view} face={face} host={host}>
          <p className="hl-caption">
            <b>{title}.</b>
          </p>
        </Part>
      ))}
      {remarksOf(view).map((remark) => (
        <p key={remark} className="hl-remark">
          {remark}
        </p>
      ))}
      {view?.figure && face.parts.some(({ part }) => part === "figure") ? (
        <FigureCommands face={face} open={open} host={host} />
      ) : null}
    </section>
  );
}

interface PartProps {
  readonly part: "figure" | "table" | "points";
  readonly view: CellView | null;
  readonly face: CellFace;
  readonly host: SheetHost;
  readonly children: ReactNode;
}

/** A figure has its caption beneath it, a table above. */
function Part({ part, view, face, host, children }: PartProps) {
  if (part === "figure") {
    return (
      <>
        <div className="hl-figure">
          {view?.figure ? <SheetFigure figure={view.figure} slot={face.slot} host={host} /> : <Frame face={face} />}
        </div>
        {children}
      </>
    );
  }
  const table = part === "table" ? view?.table : view?.points;
  return (
    <>
      {children}
      <div className="hl-rows">{table ? <Rows table={table} macros={host.macros} /> : <Frame face={face} />}</div>
    </>
  );
}

/** Holds the place of what is not there, and says why. */
function Frame({ face }: { readonly face: CellFace }) {
  const words =
    face.state === "waiting" && face.needs !== null
      ? `Waits for ${face.needs.title}`
      : face.hasResult
        ? `Fetching ${face.title}`
        : face.state === "computing"
          ? "Being set"
          : "No result";
  return <div className="hl-frame">{words}</div>;
}

function remarksOf(view: CellView | null): readonly string[] {
  return [...new Set([...(view?.figure?.remarks ?? []), ...(view?.table?.remarks ?? [])])];
}

const STATE_WORDS: Readonly<Record<CellFace["state"], string>> = {
  current: "current",
  outOfDate: "out of date",
  stands: "stands with an older result",
  computing: "being computed",
  waiting: "waiting",
  failed: "failed",
  cancelled: "out of date, cancelled",
  empty: "not computed",
  preview: "tried privately",
};

const MARKED: Readonly<Partial<Record<CellFace["state"], string>>> = {
  outOfDate: "†",
  stands: "†",
  cancelled: "†",
  failed: "‡",
};
