import { memo } from "react";
import { strandColour } from "../text/contents.ts";
import { TieEnd } from "./cord-picture.tsx";
import type { StrandDrawing } from "./types.ts";

/** From this place on the colours repeat, and a strand is drawn double. */
const COLOURS = 6;

/** One strand with its branches: over what is drawn before it, which it cuts by a gap. */
export const StrandPicture = memo(({ strand }: { readonly strand: StrandDrawing }) => {
  const { place, solid, dashed, dots, ties, lit, meant } = strand;
  const all = solid + dashed;
  return (
    <g className={`hl-strand${lit ? " hl-lit" : ""}`} stroke={strandColour(place)} fill={strandColour(place)}>
      {meant ? <path className="hl-wash" d={all} /> : null}
      <path className="hl-gap" d={all} />
      <StrandLine place={place} path={solid} />
      {dashed === "" ? null : <StrandLine place={place} path={dashed} dashed />}
      {dots.map(({ x, y }) => (
        <circle key={`${x} ${y}`} className="hl-strand-dot" cx={x} cy={y} r={2.6} />
      ))}
      {ties.map((tie) => (
        <TieEnd key={tie.id} tie={tie} />
      ))}
    </g>
  );
});

interface LineProps {
  readonly place: number;
  readonly path: string;
  readonly dashed?: boolean;
}

export function StrandLine({ place, path, dashed }: LineProps) {
  const line = dashed ? "hl-strand-line hl-dashed" : "hl-strand-line";
  if (place < COLOURS) return <path className={line} d={path} />;
  return (
    <>
      <path className={`${line} hl-double`} d={path} />
      <path className="hl-double-gap" d={path} />
    </>
  );
}
