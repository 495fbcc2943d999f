import { memo } from "react";
import { strandColour } from "../text/contents.ts";
import type { CordDrawing, End } from "./types.ts";

/** Half of a bar across a cord, and of a tie at a line [px]. */
const BAR = 9;
const TIE = 4.5;

/** One cord: its ground, its strands beneath and above each other, its ring, its ties, and what stands across it. */
export const CordPicture = memo(({ cord }: { readonly cord: CordDrawing }) => {
  const { course, plies, loose, ring, ties, bar, cut, lit } = cord;
  return (
    <g className={`hl-cord${lit ? " hl-lit" : ""}`}>
      {lit ? <path className="hl-wash hl-wash-cord" d={course} /> : null}
      <path className={lit ? "hl-cord-ground hl-cord-ground-lit" : "hl-cord-ground"} d={course} />
      {plies.map(({ id, place, under }) => (
        <path key={id} d={under} stroke={colourOf(place)} />
      ))}
      {plies.map(({ id, place, loose: path }) => (
        <path key={id} className={`hl-${loose}`} d={path} stroke={colourOf(place)} />
      ))}
      {plies.map(({ id, place, over }) => (
        <g key={id}>
          <path className={lit ? "hl-ply-gap hl-ply-gap-lit" : "hl-ply-gap"} d={over} />
          <path d={over} stroke={colourOf(place)} />
        </g>
      ))}
      {ring === null ? null : <circle className="hl-ring" cx={ring.x} cy={ring.y} r={ring.open ? 5 : 3.4} />}
      {bar === null ? null : <Across at={bar} aside={0} className="hl-cord-bar" />}
      {cut === null ? null : (
        <>
          <Across at={cut} aside={-2} className="hl-cord-cut" />
          <Across at={cut} aside={2} className="hl-cord-cut" />
        </>
      )}
      {ties.map((tie) => (
        <TieEnd key={tie.id} tie={tie} />
      ))}
    </g>
  );
});

function colourOf(place: number | null): string {
  return place === null ? "var(--edge)" : strandColour(place);
}

interface AcrossProps {
  readonly at: { readonly x: number; readonly y: number; readonly upright: boolean };
  /** Along the cord, from the place [px]. */
  readonly aside: number;
  readonly className: string;
}

function Across({ at: { x, y, upright }, aside, className }: AcrossProps) {
  const path = upright ? `M${x + aside} ${y - BAR}V${y + BAR}` : `M${x - BAR} ${y + aside}H${x + BAR}`;
  return <path className={className} d={path} />;
}

/** Where something is tied to a line: a short bar, or the mark of what is in doubt. */
export function TieEnd({ tie: { x, y, mark, faint } }: { readonly tie: End }) {
  if (mark === "") {
    return <path className={faint ? "hl-tie hl-tie-faint" : "hl-tie"} d={`M${x} ${y - TIE}V${y + TIE}`} />;
  }
  return (
    <text className="hl-tie-mark" x={x + 4} y={y + 4}>
      {mark}
    </text>
  );
}
