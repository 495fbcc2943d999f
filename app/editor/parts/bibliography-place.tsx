import { useEffect, useRef, useState } from "react";
import { Command } from "../../ui/index.ts";
import type { Desk } from "../live/desk.ts";
import { Runs } from "./runs.tsx";
import { useDeskView } from "./use-desk-view.ts";

/** The place below the sheet where what is cited stands, as it will be printed, and its BibTeX. */
export function BibliographyPlace({ desk }: { readonly desk: Desk }) {
  const bibliography = useDeskView(desk, ({ model }) => model?.bibliography ?? null);
  const macros = useDeskView(desk, ({ model }) => model?.macros ?? null);
  const ready = useDeskView(desk, (view) => view.ready);
  const [open, setOpen] = useState(false);
  const source = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (!open || source.current === null) return;
    const view = desk.openBibliography(source.current);
    return () => view.destroy();
  }, [open, desk]);
  if (!ready || bibliography === null || macros === null) return null;
  return (
    <section className="hl-bibliography" id="bibliography" aria-label="Bibliography">
      <h2 className="hl-heading-2">
        Bibliography{" "}
        <Command className="hl-small" aria-expanded={open} onClick={() => setOpen(!open)}>
          {open ? "Put the BibTeX away" : "Show the BibTeX"}
        </Command>
      </h2>
      {bibliography.length === 0 ? <p className="hl-none">Nothing is cited yet.</p> : null}
      <ol className="hl-entries">
        {bibliography.map((entry) => (
          <li key={entry.key} value={entry.number}>
            <Runs runs={entry.runs} macros={macros} />
          </li>
        ))}
      </ol>
      {open ? <div ref={source} className="hl-bibtex" /> : null}
    </section>
  );
}
