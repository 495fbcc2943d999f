import type { Series } from "./types.ts";

/** The formula by which a sentence quotes a point of a series: "K(3)"; "" where there is none. */
export function quoteOf({ quote, x, y, log10y }: Series, i: number): string {
  const place = x[i];
  if (quote === undefined || place === undefined || (y[i] ?? log10y?.[i] ?? null) === null) return "";
  return typeof quote === "string" ? quote.replaceAll("#", placeText(place)) : (quote[i] ?? "");
}

/** Digits of a place between whole ones: nobody quotes a curve at a place with sixteen. */
const DIGITS = 4;

function placeText(place: number): string {
  const text = String(Number.isInteger(place) ? place : Number(place.toPrecision(DIGITS)));
  return place < 0 ? `(${text})` : text;
}
