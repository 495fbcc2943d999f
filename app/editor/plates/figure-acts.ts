import type { Store } from "../live/store.ts";
import type { CellFace } from "../model/types.ts";
import type { SheetHost } from "../text/host.ts";
import type { PlatesView } from "./types.ts";

export type CopyAs = "svg" | "png" | "csv";

type Named = Pick<CellFace, "slot" | "title">;

/** Gives the keys to the curves of a figure. */
export function readFigure(plates: Store<PlatesView>, { slot }: Named): void {
  plates.set({ read: slot });
}

/** Opens the fields for the axes of a figure. */
export function setAxes(plates: Store<PlatesView>, { slot }: Named): void {
  plates.set({ axesOf: slot });
}

const WORDS: Readonly<Record<CopyAs, string>> = { svg: "as SVG", png: "as PNG", csv: "points as CSV" };

/**
 * Puts a figure, or its points, on the clipboard, and says so. Where the clipboard refuses, the same is offered as a file
 * beneath the figure.
 */
export async function copyFigure(host: SheetHost, { slot, title }: Named, as: CopyAs): Promise<void> {
  const figure = host.views.get(slot)?.view.figure ?? null;
  if (figure === null) return;
  const what = `${title} ${WORDS[as]}`;
  putAwayOffer(host.plates);
  try {
    // The maker of files is fetched on use.
    const { takenOf } = await import("./taking.ts");
    const taken = takenOf(figure, as);
    if (await isOnClipboard(taken, as)) {
      host.tell(`${what}: on the clipboard.`);
      return;
    }
    const name = `${title.toLowerCase().replaceAll(" ", "-")}.${as}`;
    host.plates.set({ offered: { slot, what, name, address: URL.createObjectURL(await taken) } });
    host.tell(`The clipboard refused ${what}. It is offered as a file beneath the figure.`);
  } catch (error) {
    host.tell(`${what} could not be made: ${error instanceof Error ? error.message : String(error)}`);
  }
}

export function putAwayOffer(plates: Store<PlatesView>): void {
  const { offered } = plates.get();
  if (offered !== null) URL.revokeObjectURL(offered.address);
  plates.set({ offered: null });
}

/** Whether the clipboard took it. A page without one, as over plain http, has none to ask. */
async function isOnClipboard(taken: Promise<Blob>, as: CopyAs): Promise<boolean> {
  try {
    if (as === "png") await navigator.clipboard.write([new ClipboardItem({ "image/png": taken })]);
    else await navigator.clipboard.writeText(await (await taken).text());
    return true;
  } catch {
    return false;
  }
}
