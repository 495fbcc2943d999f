import type { SheetModel } from "../model/types.ts";
import { sameLook } from "../text/cell-widget.tsx";

/** Told anew with each answer, or where things stand: they are looked at by themselves. */
const BY_THEMSELVES: ReadonlySet<keyof SheetModel> = new Set<keyof SheetModel>(["version", "pieces", "cells", "views"]);

/**
 * Whether an answer shows what the one before did, but for where it stands: as after a letter in plain prose. Nothing
 * has to be drawn for it then. Parts that have not changed are the very objects of before (`unpackSheet`).
 */
export function showsTheSame(before: SheetModel | null, model: SheetModel): boolean {
  if (before === null) return false;
  const { base, middle, starts } = model.pieces;
  const samePieces =
    base !== 0 && base === before.pieces.number && middle.length === 0 && starts.length === before.pieces.starts.length;
  if (!samePieces || Object.keys(model.views).length > 0) return false;
  const names = Object.keys(model) as (keyof SheetModel)[];
  if (!names.every((name) => BY_THEMSELVES.has(name) || Object.is(before[name], model[name]))) return false;
  const { cells } = before;
  return (
    model.cells === cells ||
    (model.cells.length === cells.length &&
      model.cells.every((face, at) => {
        const was = cells[at];
        return was !== undefined && was.slot === face.slot && sameLook(was, face);
      }))
  );
}
