import type { PackedSheet } from "./messages.ts";
import type { CellFace, SheetModel } from "./types.ts";

/** Parts that mostly stay as they are from one answer to the next: told only when they are others. */
const LASTING = [
  "front",
  "macros",
  "parameters",
  "problems",
  "bibliography",
  "wanted",
  "errata",
  "words",
  "names",
] as const;
type Lasting = (typeof LASTING)[number];

/** Remembers what the last answer told, so that the next tells what is other. The worker's side. */
export class SheetPacker {
  private number = 0;
  private readonly told = new Map<Lasting, string>();
  private looks = new Map<string, string>();

  /**
   * An answer without what the page has.
   * @param have number of the answer that the page has
   */
  pack(model: SheetModel, have: number): PackedSheet {
    const known = have !== 0 && have === this.number;
    this.number = model.pieces.number;
    const packed: { -readonly [Name in keyof PackedSheet]: PackedSheet[Name] } = { ...model };
    for (const name of LASTING) {
      const sign = JSON.stringify(model[name]);
      if (known && this.told.get(name) === sign) delete packed[name];
      this.told.set(name, sign);
    }
    const before = this.looks;
    this.looks = new Map();
    packed.cells = model.cells.map((face) => {
      const { from, to, line, slot } = face;
      const look = JSON.stringify({ ...face, from: 0, to: 0, line: 0 });
      this.looks.set(slot, look);
      return known && before.get(slot) === look ? { slot, from, to, line } : face;
    });
    return packed;
  }
}

/**
 * The whole sheet from an answer and the sheet before it. Parts that have not changed are the very objects of before,
 * so that what is drawn of them need not be looked at. The page's side.
 */
export function unpackSheet(before: SheetModel | null, packed: PackedSheet): SheetModel {
  const lasting = <Name extends Lasting>(name: Name): SheetModel[Name] => {
    const told: Partial<Pick<SheetModel, Lasting>> = name in packed ? packed : (before ?? {});
    const part = told[name];
    if (part === undefined) throw new Error(`The first answer about a paper did not tell its ${name}.`);
    return part;
  };
  return {
    version: packed.version,
    front: lasting("front"),
    macros: lasting("macros"),
    pieces: packed.pieces,
    parameters: lasting("parameters"),
    cells: unpackCells(before?.cells ?? [], packed.cells),
    views: packed.views,
    problems: lasting("problems"),
    bibliography: lasting("bibliography"),
    wanted: lasting("wanted"),
    errata: lasting("errata"),
    words: lasting("words"),
    names: lasting("names"),
    preview: packed.preview,
  };
}

function unpackCells(before: readonly CellFace[], packed: PackedSheet["cells"]): readonly CellFace[] {
  const known = new Map(before.map((face) => [face.slot, face]));
  const cells = packed.map((told): CellFace => {
    if ("state" in told) return told;
    const { slot, from, to, line } = told;
    const face = known.get(slot);
    if (face === undefined) throw new Error(`An answer tells of ${slot} only where it stands.`);
    return face.from === from && face.to === to && face.line === line ? face : { ...face, from, to, line };
  });
  return cells.length === before.length && cells.every((face, at) => face === before[at]) ? before : cells;
}
