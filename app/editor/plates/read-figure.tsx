import { useLayoutEffect, useMemo, useRef } from "react";
import { figureReadings } from "../../cells/index.ts";
import { type Figure, FigureReading } from "../../figures/index.ts";

interface Props {
  readonly figure: Figure;
  /** Of the plate beneath [px]. */
  readonly width: number;
  /** Where the pointer is already, in the window. */
  readonly pointed: { readonly clientX: number; readonly clientY: number } | null;
  /** The keys walk along the curves until they leave. */
  readonly byKeys: boolean;
  onLeave(): void;
}

/** A figure of the sheet while it is read. What had the keys before gets them back at Esc. */
export function ReadFigure({ figure, width, pointed, byKeys, onLeave }: Props) {
  const readings = useMemo(() => figureReadings(figure), [figure]);
  const before = useRef<Element | null>(null);
  const leaving = useRef(onLeave);
  leaving.current = onLeave;
  // Before the curve takes the keys, which it does once all of this is on the page.
  useLayoutEffect(() => {
    if (!byKeys) return;
    before.current = document.activeElement;
    return () => leaving.current();
  }, [byKeys]);
  const leave = (by: "escape" | "focus") => {
    onLeave();
    if (by === "escape" && before.current instanceof HTMLElement) before.current.focus({ preventScroll: true });
  };
  return (
    <FigureReading
      figure={figure}
      readings={readings}
      width={width}
      pointed={pointed}
      curvesByTab={byKeys}
      takesKeys={byKeys}
      onLeave={leave}
    />
  );
}
