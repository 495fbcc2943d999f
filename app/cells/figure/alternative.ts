import type { Crossing, Figure, Series } from "../../figures/index.ts";
import { crossings, labelText, levelCrossings } from "../../figures/index.ts";
import { printNumber, scaled } from "../../formulas/index.ts";
import type { Told } from "../sweep/finding.ts";
import { movementWords } from "../sweep/finding.ts";
import { shortNumber } from "../values.ts";

const MOST_TOLD = 6;
const MOST_CROSSINGS = 4;
/** Beyond so many decades a double is no longer what is told. */
const SAFE_DECADES = 300;

/** Says the finding: over what the curves stand, where each begins, ends and turns, where they cross one another and the levels. */
export function alternativeOf(figure: Figure): string {
  const named = figure.series.filter((series) => series.mark !== "band" && series.parametric !== true);
  const told = named.slice(0, MOST_TOLD).map((series) => {
    const words = curveWords(piecesOf(series, figure));
    return `${nameOf(series)} ${words === "" ? "has no value" : words}.`;
  });
  const more = named.length - MOST_TOLD;
  const rest = more > 0 ? [`${more} further ${more === 1 ? "curve" : "curves"}.`] : [];
  const inside = figure.inset ? [`Inset: ${figure.inset.figure.alternative}`] : [];
  return [rangeWords(figure, named), ...told, ...rest, ...crossingWords(figure, named), ...bandWords(figure), ...inside]
    .filter((part) => part !== "")
    .join(" ");
}

/** The name that stands beside the curve. */
const nameOf = ({ label, name }: Series): string => (label === "" ? name : labelText(label));

function rangeWords(figure: Figure, series: readonly Series[]): string {
  const places = series.flatMap(({ x }) => x.filter((at) => isShown(at, figure)));
  const [least, most] = [Math.min(...places), Math.max(...places)];
  if (series.length === 0 || !Number.isFinite(least)) return "";
  const count = series.length === 1 ? "One curve" : `${series.length} curves`;
  return `${count} over ${labelText(figure.x.label)} from ${shortNumber(least)} to ${shortNumber(most)}.`;
}

const isShown = (x: number, { x: { range } }: Figure): boolean => range === null || (x >= range[0] && x <= range[1]);

/** Places nearer than this, relative to themselves, are one: the ends on both sides of a jump. */
const ONE_PLACE = 1e-9;

/** What a curve does, piece by piece: where it jumps, and where it has a gap. */
function curveWords(pieces: readonly (readonly Told[])[]): string {
  return pieces
    .map((piece, i) => {
      const movement = movementWords(piece);
      const [end, begin] = [pieces[i - 1]?.at(-1)?.x, piece[0]?.x];
      if (end === undefined || begin === undefined) return movement;
      const isJump = Math.abs(begin - end) <= ONE_PLACE * Math.max(Math.abs(begin), Math.abs(end));
      return isJump
        ? `; it jumps at ${shortNumber(begin)}, from where on it ${movement}`
        : `; after a gap from ${shortNumber(end)} to ${shortNumber(begin)} it ${movement}`;
    })
    .join("");
}

/** The points of a series within its axis, parted at its gaps. */
function piecesOf(series: Series, figure: Figure): readonly (readonly Told[])[] {
  const pieces: Told[][] = [[]];
  const order = [...series.x.keys()].sort((a, b) => (series.x[a] ?? 0) - (series.x[b] ?? 0));
  for (const i of order) {
    const x = series.x[i] ?? Number.NaN;
    const told = isShown(x, figure) ? toldPoint(series, i, x) : null;
    if (told !== null) pieces.at(-1)?.push(told);
    else if (pieces.at(-1)?.length !== 0) pieces.push([]);
  }
  return pieces.filter((piece) => piece.length > 0);
}

function toldPoint(series: Series, i: number, x: number): Told | null {
  const y = series.y[i] ?? null;
  const log10 = series.log10y?.[i] ?? null;
  if (log10 !== null && Math.abs(log10) > SAFE_DECADES) return { x, y: 0, error: 0, words: deepNumber(log10) };
  const high = series.high?.[i] ?? null;
  return y === null ? null : { x, y, error: high === null ? 0 : Math.abs(high - y) };
}

/** 10^log10 to two digits. */
function deepNumber(log10: number): string {
  const exponent = Math.floor(log10 * Math.log2(10));
  return printNumber(scaled(2 ** (log10 * Math.log2(10) - exponent), exponent, 0), { digits: 2 }).text;
}

function crossingWords(figure: Figure, series: readonly Series[]): readonly string[] {
  const withOthers = series.flatMap((a, i) =>
    series.slice(i + 1).flatMap((b) => {
      const places = crossings(figure, a, b).map((crossing) => placeWords(crossing, [a, b]));
      return places.length === 0 ? [] : [`${nameOf(a)} and ${nameOf(b)} cross ${listed(places)}.`];
    }),
  );
  const withLevels = series.flatMap((a) =>
    figure.levels.flatMap(({ y, label }) => {
      const places = levelCrossings(figure, a, y).map((crossing) => placeWords(crossing, [a]));
      const level = label === "" ? shortNumber(y) : labelText(label);
      return places.length === 0 ? [] : [`${nameOf(a)} passes ${level} ${listed(places)}.`];
    }),
  );
  const all = [...withOthers, ...withLevels];
  const more = all.length - MOST_CROSSINGS;
  return more > 0 ? [...all.slice(0, MOST_CROSSINGS), `${more} further crossings.`] : all;
}

/** Between points there is nothing that crosses; lines do so near a place. */
function placeWords({ x, between: [from, to] }: Crossing, series: readonly Series[]): string {
  const isPoints = series.every(({ mark }) => mark !== "line");
  return isPoints ? `between ${shortNumber(from)} and ${shortNumber(to)}` : `near ${shortNumber(x)}`;
}

function listed(places: readonly string[]): string {
  const shown = places.slice(0, MOST_CROSSINGS);
  return shown.length < places.length ? `${shown.join(", ")} and further on` : shown.join(", ");
}

function bandWords(figure: Figure): readonly string[] {
  return figure.series.flatMap((series) => {
    if (series.mark !== "band") return [];
    const [low, high] = [series.low ?? [], series.high ?? []].map((ends) => ends.filter((end) => end !== null));
    if (!low?.length || !high?.length) return [];
    return [
      `Band ${nameOf(series)} lies between ${shortNumber(Math.min(...low))} and ${shortNumber(Math.max(...high))}.`,
    ];
  });
}
