/** Where something stands on the page. */
export interface Box {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

export type Arrow = "ArrowUp" | "ArrowDown" | "ArrowLeft" | "ArrowRight";

/**
 * Which of some boxes an arrow leads to from one of them: the nearest in that direction, what lies straight on before what
 * lies aside. The box itself where there is none; the first where one is at none yet.
 */
export function nextBox(boxes: readonly Box[], at: number, arrow: Arrow): number {
  const here = boxes[at];
  if (here === undefined) return boxes.length > 0 ? 0 : -1;
  let best = at;
  let least = Number.POSITIVE_INFINITY;
  boxes.forEach((box, place) => {
    const ahead = AHEAD[arrow](here, box);
    if (place === at || ahead < 0) return;
    const isUpright = arrow === "ArrowUp" || arrow === "ArrowDown";
    const aside = isUpright
      ? apart(here.left, here.right, box.left, box.right)
      : apart(here.top, here.bottom, box.top, box.bottom);
    const far = ahead + ASIDE * aside;
    if (far >= least) return;
    [best, least] = [place, far];
  });
  return best;
}

/** A way aside counts as so many straight on. */
const ASIDE = 6;
/** Borders of neighbours may lie upon each other [px]. */
const SLACK = 2;

const AHEAD: Readonly<Record<Arrow, (here: Box, there: Box) => number>> = {
  ArrowDown: (here, there) => gap(there.top - here.bottom),
  ArrowUp: (here, there) => gap(here.top - there.bottom),
  ArrowRight: (here, there) => gap(there.left - here.right),
  ArrowLeft: (here, there) => gap(here.left - there.right),
};

function gap(distance: number): number {
  return distance < -SLACK ? -1 : Math.max(0, distance);
}

/** How far two stretches lie apart; where they overlap, how far their beginnings do, counted little. */
function apart(from: number, to: number, otherFrom: number, otherTo: number): number {
  if (otherTo < from) return from - otherTo;
  if (otherFrom > to) return otherFrom - to;
  return Math.abs(otherFrom - from) / 100;
}
