import type { ParameterFace } from "../model/types.ts";
import { strandColour } from "../text/contents.ts";
import { GlossText } from "./gloss-text.tsx";
import { Letter } from "./letter.tsx";
import { StrandLine } from "./strand-picture.tsx";
import { useStrands } from "./use-strands.ts";
import type { StrandWatch } from "./watch.ts";

interface Props {
  readonly watch: StrandWatch;
  readonly parameters: readonly ParameterFace[];
}

/** The heads of the strands under the rule, with which they stay while the sheet scrolls beneath. */
export function StrandHeads({ watch, parameters }: Props) {
  const heads = useStrands(watch, (view) => view.heads);
  const top = useStrands(watch, (view) => view.ruleHeight);
  const picture = useStrands(watch, (view) => view.picture);
  const gloss = useStrands(watch, (view) => view.gloss);
  const isLit = (place: number) => picture?.strands.some((strand) => strand.place === place && strand.lit) ?? false;
  const place = picture?.frame.gloss ?? null;
  return (
    <div
      className={`hl-strand-heads hl-strands-${picture?.frame.size}${picture?.dim ? " hl-strands-dim" : ""}`}
      style={{ top }}
      aria-hidden="true"
    >
      <svg width="100%" height="30">
        <title>Strands</title>
        {heads.map(({ place, path, dot, bundled }) => {
          const grey = bundled && !isLit(place);
          const colour = grey ? "var(--edge)" : strandColour(place);
          return (
            <g key={place} className={`hl-strand${isLit(place) ? " hl-lit" : ""}`} stroke={colour} fill={colour}>
              <path className="hl-gap" d={path} />
              <StrandLine place={grey ? 0 : place} path={path} />
              {dot === null ? null : <circle className="hl-strand-dot" cx={dot} cy={0} r={3.2} />}
            </g>
          );
        })}
      </svg>
      {heads.map(({ place, letter }) =>
        letter === null ? null : (
          <Letter key={place} place={place} tex={parameters[place]?.symbol ?? ""} {...letter} lit={isLit(place)} on />
        ),
      )}
      {gloss === null || place === null || picture?.gloss != null ? null : (
        <aside className="hl-strand-gloss" style={{ ...place, top: 44 }}>
          <GlossText gloss={gloss} />
        </aside>
      )}
    </div>
  );
}
