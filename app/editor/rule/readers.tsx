import type { StillRead } from "../../cells/index.ts";
import { Command } from "../../ui/index.ts";
import type { SheetAtHand } from "../keys/types.ts";
import type { CellFace } from "../model/types.ts";

interface Props {
  readonly sheet: SheetAtHand;
  readonly name: string;
  readonly stillRead: StillRead;
}

/** So many are named with a command each; the others follow when these are mended. */
const MOST = 6;

/** Why a parameter cannot be removed: what still reads it, with commands that go there. */
export function Readers({ sheet, name, stillRead }: Props) {
  const cells = sheet.desk.store.get().model?.cells ?? [];
  const places = placesOf(stillRead, cells);
  const more = places.length - MOST;
  return (
    <div className="hl-entry-words hl-amiss" role="alert">
      ‡ {name} is still read, and stays until nothing reads it. Go to{" "}
      {places.slice(0, MOST).map(({ at, words }, place) => (
        <span key={at}>
          {place === 0 ? "" : ", "}
          <Command
            onClick={() => {
              sheet.strips.set({ open: null });
              sheet.desk.goTo(at);
            }}
          >
            {words}
          </Command>
        </span>
      ))}
      {more > 0 ? ` and ${more} more` : ""}.
    </div>
  );
}

interface Reader {
  readonly at: number;
  readonly words: string;
}

/** "Table 1", "process larvae", "line 41": each cell and each line once. */
export function placesOf(
  { readers }: StillRead,
  cells: readonly Pick<CellFace, "from" | "to" | "kind" | "title">[],
): readonly Reader[] {
  const seen = new Set<string>();
  return readers.flatMap(({ at, line }) => {
    const cell = cells.find(({ kind, from, to }) => kind !== "parameters" && from <= at && at <= to);
    const words = cell?.title ?? `line ${line}`;
    if (seen.has(words)) return [];
    seen.add(words);
    return [{ at, words }];
  });
}
