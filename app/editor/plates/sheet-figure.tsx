import { lazy, memo, Suspense, useCallback, useMemo, useState } from "react";
import { type Figure, FigurePlate } from "../../figures/index.ts";
import type { SheetHost } from "../text/host.ts";
import type { AxisTried, PlatesView } from "./types.ts";
import { usePlates } from "./use-plates.ts";

/** What a plate is read with: fetched when the first one is. */
const ReadFigure = lazy(async () => ({ default: (await import("./read-figure.tsx")).ReadFigure }));

/** What passes beneath the pointer while the page scrolls is not read [ms]. */
const REST_MS = 120;

interface Props {
  readonly figure: Figure;
  readonly slot: string;
  readonly host: SheetHost;
}

/** Where the pointer came upon a figure, in the window. */
interface Pointed {
  readonly clientX: number;
  readonly clientY: number;
}

/**
 * A figure as wide as the column, read by the pointer over it and, when asked, by the keys. The same figure in the same
 * width is not drawn again when text above it changes.
 */
export const SheetFigure = memo(({ figure, slot, host }: Props) => {
  const [measured, setMeasured] = useState(0);
  const [pointed, setPointed] = useState<Pointed | null>(null);
  const read = usePlates(host.plates, (view) => view.read === slot);
  const tried = usePlates(host.plates, (view) => triedOn(view, slot, figure));
  const drawn = useMemo(
    () => (tried === null ? figure : { ...figure, x: axisAs(figure.x, tried.x), y: axisAs(figure.y, tried.y) }),
    [figure, tried],
  );
  const watch = useCallback((place: HTMLDivElement | null) => {
    if (place === null) return;
    const observer = new ResizeObserver(() => setMeasured(Math.round(place.clientWidth)));
    observer.observe(place);
    let resting: ReturnType<typeof setTimeout> | undefined;
    const enter = ({ clientX, clientY, pointerType }: PointerEvent) => {
      resting = setTimeout(() => setPointed({ clientX, clientY }), pointerType === "touch" ? 0 : REST_MS);
    };
    // A finger that is lifted leaves as well; what it asked for stays to be read.
    const leave = ({ pointerType }: PointerEvent) => {
      if (pointerType === "touch") return;
      clearTimeout(resting);
      setPointed(null);
    };
    place.addEventListener("pointerenter", enter);
    place.addEventListener("pointerleave", leave);
    return () => {
      clearTimeout(resting);
      observer.disconnect();
      place.removeEventListener("pointerenter", enter);
      place.removeEventListener("pointerleave", leave);
    };
  }, []);
  const width = measured > 0 ? measured : host.columnWidth;
  return (
    <div ref={watch} className="figure-read">
      <FigurePlate figure={drawn} width={width} />
      {read || pointed !== null ? (
        <Suspense fallback={null}>
          <ReadFigure
            figure={drawn}
            width={width}
            pointed={pointed}
            byKeys={read}
            onLeave={() => host.plates.set({ read: null })}
          />
        </Suspense>
      ) : null}
    </div>
  );
});

/** While axes are being set they are tried on whatever figure their cell has; after that, until it has another. */
function triedOn({ tried, axesOf }: PlatesView, slot: string, figure: Figure): PlatesView["tried"] {
  return tried?.slot === slot && (axesOf === slot || tried.figure === figure) ? tried : null;
}

function axisAs(axis: Figure["x"], { range, scale }: AxisTried): Figure["x"] {
  return { ...axis, range, scale };
}
