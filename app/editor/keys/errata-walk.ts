import type { Erratum } from "../model/types.ts";
import type { SheetAtHand } from "./types.ts";

/** Where the walk stands in each sheet: the erratum gone to last, by its place. */
const stands = new WeakMap<SheetAtHand["view"], number>();

/**
 * The erratum after, or before, a place of the text; past the last one comes the first.
 * @param errata in the order of the text
 */
export function erratumFrom(errata: readonly Erratum[], place: number, direction: 1 | -1): Erratum | null {
  if (direction === 1) return errata.find(({ from }) => from > place) ?? errata[0] ?? null;
  return errata.findLast(({ from }) => from < place) ?? errata.at(-1) ?? null;
}

/** Goes to the next or the previous erratum, and says which it is. */
export function goToErratum(sheet: Pick<SheetAtHand, "desk" | "view">, direction: 1 | -1): void {
  const errata = sheet.desk.store.get().model?.errata ?? [];
  const found = erratumFrom(errata, stands.get(sheet.view) ?? -1, direction);
  if (found !== null) showErratum(sheet, found);
}

/** A plate is shown as it stands, with its commands in hand; in a sentence the caret goes to what is amiss. */
export function showErratum({ desk, view }: Pick<SheetAtHand, "desk" | "view">, erratum: Erratum): void {
  stands.set(view, erratum.from);
  if (erratum.what === "cell") desk.showPlate(erratum.from);
  else desk.goTo(erratum.from);
  desk.say(`${erratumWords(erratum)}.`);
}

/** "Table 1 is out of date", "a number in line 41 has no value", "line 12 is at fault" */
export function erratumWords({ what, mark, title, line }: Erratum): string {
  if (what === "problem") return `${title} is at fault`;
  const named = what === "number" ? `${title} in line ${line}` : title;
  if (mark === "†") return `${named} is out of date`;
  return what === "number" ? `${named} has no value` : `${named} is to be mended`;
}
