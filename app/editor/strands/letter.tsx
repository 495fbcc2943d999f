import { type CSSProperties, memo } from "react";
import { ourMarkup } from "../../ui/markup.ts";
import { renderMath } from "../../ui/math.ts";
import { strandColour } from "../text/contents.ts";

interface Props {
  readonly place: number;
  readonly tex: string;
  readonly x: number;
  readonly y: number;
  readonly lit: boolean;
  readonly small?: boolean;
  /** Its middle is at x, on the strand; else it begins there. */
  readonly on?: boolean;
}

/** The letter of a parameter at its strand: colour is never alone. */
export const Letter = memo(({ place, tex, x, y, lit, small, on }: Props) => (
  <span
    className={`hl-strand-letter${small ? " hl-small-letter" : ""}${on ? " hl-strand-letter-on" : ""}${lit ? " hl-lit" : ""}`}
    style={{ left: x, top: y, color: strandColour(place) } as CSSProperties}
    {...ourMarkup(renderMath(tex, false))}
  />
));
