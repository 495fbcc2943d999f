import type { ReactNode } from "react";
import type { CellFace } from "../model/types.ts";
import type { SheetHost } from "../text/host.ts";
import { copyFigure, putAwayOffer, readFigure, setAxes } from "./figure-acts.ts";
import { usePlates } from "./use-plates.ts";

interface Props {
  readonly face: CellFace;
  /** The caret is in the cell. */
  readonly open: boolean;
  readonly host: SheetHost;
}

/** What may be done with a figure: shown while it is pointed at, has the keys or the caret. Otherwise paper stays paper. */
export function FigureCommands({ face, open, host }: Props) {
  const offered = usePlates(host.plates, (view) => (view.offered?.slot === face.slot ? view.offered : null));
  const hasAxes = host.writes && (host.views.get(face.slot)?.view.figure?.panels?.length ?? 0) === 0;
  return (
    <>
      {offered === null ? null : (
        <p className="hl-figure-offer">
          The clipboard refused it.{" "}
          <a className="command hl-small" href={offered.address} download={offered.name}>
            Take {offered.what} as a file
          </a>
          <Press of={face.title} onPress={() => putAwayOffer(host.plates)}>
            Put away
          </Press>
        </p>
      )}
      <div className={open ? "hl-figure-commands hl-figure-at-hand" : "hl-figure-commands"}>
        <Press of={face.title} onPress={() => readFigure(host.plates, face)}>
          Read the figure
        </Press>
        {isKept(face) ? (
          <a
            className="command hl-small hl-quiet"
            href={host.plateOf(face.id)}
            aria-label={`Open as plate, ${face.title}`}
          >
            Open as plate
          </a>
        ) : null}
        <Press of={face.title} onPress={() => void copyFigure(host, face, "svg")}>
          Copy as SVG
        </Press>
        <Press of={face.title} onPress={() => void copyFigure(host, face, "png")}>
          Copy as PNG
        </Press>
        <Press of={face.title} onPress={() => void copyFigure(host, face, "csv")}>
          Copy points (CSV)
        </Press>
        {hasAxes ? (
          <Press of={face.title} onPress={() => setAxes(host.plates, face)}>
            Set the axes
          </Press>
        ) : null}
      </div>
    </>
  );
}

/** Whether the paper keeps the result that is shown, so that it has a plate of its own. */
function isKept({ provenance, state }: CellFace): boolean {
  return provenance.length > 0 && state !== "preview";
}

interface PressProps {
  readonly of: string;
  readonly children: ReactNode;
  onPress(): void;
}

function Press({ of, children, onPress }: PressProps) {
  return (
    <button
      type="button"
      className="command hl-small hl-quiet"
      // The caret stays where it is, or the working would close under the pointer.
      onMouseDown={(event) => event.preventDefault()}
      onClick={onPress}
      aria-label={`${children}, ${of}`}
    >
      {children}
    </button>
  );
}
