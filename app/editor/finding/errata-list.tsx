import { Command } from "../../ui/index.ts";
import { erratumWords, showErratum } from "../keys/errata-walk.ts";
import type { SheetAtHand } from "../keys/types.ts";
import { useDeskView } from "../parts/use-desk-view.ts";

/** All that is out of date or failed, in the order of the text; each leads to its place. */
export function ErrataList({ sheet }: { readonly sheet: SheetAtHand }) {
  const errata = useDeskView(sheet.desk, ({ model }) => model?.errata ?? NONE);
  if (errata.length === 0) return <p className="hl-strip-words">Errata none. Every number is current.</p>;
  return (
    <ol className="hl-places">
      {errata.map((erratum) => (
        <li key={`${erratum.from} ${erratum.what}`}>
          <span className="hl-place-line">{erratum.line}</span>
          <b className="hl-lead" aria-hidden="true">
            {erratum.mark}{" "}
          </b>
          <Command onClick={() => showErratum(sheet, erratum)}>{erratumWords(erratum)}</Command>
        </li>
      ))}
    </ol>
  );
}

const NONE: readonly never[] = [];
