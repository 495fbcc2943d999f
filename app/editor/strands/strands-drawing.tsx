import { memo } from "react";
import type { ParameterFace } from "../model/types.ts";
import { CordPicture, TieEnd } from "./cord-picture.tsx";
import { Letter } from "./letter.tsx";
import { StrandPicture } from "./strand-picture.tsx";
import type { BundleDrawing, Picture } from "./types.ts";
import { useStrands } from "./use-strands.ts";
import type { StrandWatch } from "./watch.ts";

interface Props {
  readonly watch: StrandWatch;
  readonly parameters: readonly ParameterFace[];
}

/** The strands and cords behind the text. For the eye: whoever listens hears the same in words at each number. */
export function StrandsDrawing({ watch, parameters }: Props) {
  const picture = useStrands(watch, (view) => view.picture);
  if (picture === null) return null;
  const { frame, strands, cords } = picture;
  const symbols = parameters.map(({ symbol }) => symbol);
  return (
    <div className={`hl-strands hl-strands-${frame.size}${picture.dim ? " hl-strands-dim" : ""}`} aria-hidden="true">
      {/* Moved and not placed: a place that changes while one scrolls would count, and be drawn, as a shift of the page. */}
      <svg
        width="100%"
        height={Math.max(0, picture.bottom - picture.top)}
        style={{ transform: `translateY(${picture.top}px)` }}
      >
        <title>Strands</title>
        <g transform={`translate(0 ${-picture.top})`}>
          {picture.strandBundle === null ? null : <Bundle bundle={picture.strandBundle} />}
          {strands.map((strand) => (
            <StrandPicture key={strand.place} strand={strand} />
          ))}
          {picture.cordBundle === null ? null : <Bundle bundle={picture.cordBundle} />}
          {cords.map((cord) => (
            <CordPicture key={cord.slot} cord={cord} />
          ))}
          <Hairlines picture={picture} />
        </g>
      </svg>
      {strands.map(({ place, letters, lit }) =>
        letters.map(({ id, x, y, small }) => (
          <Letter key={id} place={place} tex={symbols[place] ?? ""} x={x} y={y} small={small} lit={lit} />
        )),
      )}
    </div>
  );
}

/** Many as one, with how many they are. */
const Bundle = memo(({ bundle }: { readonly bundle: BundleDrawing }) => {
  const { course, rings, ties, count } = bundle;
  return (
    <g className="hl-bundle">
      <path d={course} />
      {rings.map(({ id, x, y }) => (
        <circle key={id} cx={x} cy={y} r={2.6} />
      ))}
      {ties.map((tie) => (
        <TieEnd key={tie.id} tie={tie} />
      ))}
      <text x={count.x} y={count.y}>
        {count.words}
      </text>
    </g>
  );
});

/** From the tie below the line to the number that is lit, and from the gloss to the cord. */
function Hairlines({ picture: { hairlines, gloss, frame } }: { readonly picture: Picture }) {
  const right = frame.gloss === null ? 0 : frame.gloss.left + frame.gloss.width + 6;
  return (
    <g className="hl-hairlines">
      {hairlines.length === 0 ? null : <path d={hairlines.join("")} />}
      {gloss === null || gloss.to === null || frame.gloss === null ? null : (
        <path className="hl-hairline-gloss" d={`M${right} ${gloss.y}H${gloss.to}`} />
      )}
    </g>
  );
}
