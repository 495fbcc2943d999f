import "./case.css";
import "./case-narrow.css";
import { type KeyboardEvent, useEffect, useMemo, useRef, useState } from "react";
import type { SheetAtHand } from "../keys/types.ts";
import { useDeskView } from "../parts/use-desk-view.ts";
import { counted } from "../parts/words.ts";
import { type Arrow, nextBox } from "./arrows.ts";
import { Compartments, LIST_ID, offerElementId, Words } from "./compartments.tsx";
import { useCaseKnowledge } from "./knowing.ts";
import { lay } from "./lay.ts";
import { bestOffer, offers, wantedOffers } from "./offers.ts";
import { caretOf, setOffer } from "./set-offer.ts";
import { useSlot } from "./slot.ts";
import type { Offer } from "./types.ts";

/** The case: one types what one wants, and it is set at the caret as the paper would have it. */
export function CaseStrip({ sheet }: { readonly sheet: SheetAtHand }) {
  const { desk, view } = sheet;
  const [query, setQuery] = useState("");
  /** Chosen by the arrows or the pointer; until then the best answer is. */
  const [pointed, setPointed] = useState<string | null>(null);
  const byArrows = useRef(false);
  const knowledge = useCaseKnowledge(sheet, query);
  const macros = useDeskView(desk, ({ model }) => model?.macros ?? NO_MACROS);
  const compartments = useMemo(() => (knowledge === null ? [] : offers(query, knowledge)), [query, knowledge]);
  const wanted = wantedOffers(compartments);
  const active = wanted.find(({ id }) => id === pointed) ?? bestOffer(query, compartments);
  useSlot(view, active);
  const activeId = active?.id ?? "";
  useEffect(() => {
    if (activeId !== "") document.getElementById(offerElementId(activeId))?.scrollIntoView?.({ block: "nearest" });
  }, [activeId]);
  const set = (offer: Offer) => setOffer(sheet, offer);
  const press = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key === "Enter") {
      event.preventDefault();
      if (active !== null) set(active);
      else desk.say("Nothing is chosen. Type what you want, or go to it with the arrows.");
      return;
    }
    const along = event.key === "ArrowLeft" || event.key === "ArrowRight";
    if (!ARROWS.has(event.key) || (along && query !== "" && !byArrows.current)) return;
    event.preventDefault();
    byArrows.current = true;
    const at = active === null ? -1 : wanted.indexOf(active);
    const next = wanted[nextBox(wanted.map(boxOf), at, event.key as Arrow)];
    if (next === undefined) return;
    setPointed(next.id);
  };
  return (
    <div className="hl-case">
      <div className="hl-case-top">
        <span className="hl-case-line">to be set at line {lineOf(sheet, active)}</span>
        <input
          data-first
          className="hl-case-field"
          role="combobox"
          aria-label="What is to be set"
          aria-expanded="true"
          aria-controls={LIST_ID}
          aria-autocomplete="list"
          aria-activedescendant={active === null ? undefined : offerElementId(active.id)}
          placeholder="what you want, in a word or two"
          value={query}
          onChange={({ target }) => {
            byArrows.current = false;
            setPointed(null);
            setQuery(target.value);
          }}
          onKeyDown={press}
          autoComplete="off"
          autoCapitalize="off"
          spellCheck={false}
        />
        <span className="hl-case-keys">
          <kbd>Enter</kbd> sets it <kbd>arrows</kbd> move <kbd>Esc</kbd> closes
        </span>
      </div>
      {knowledge === null ? (
        <p className="hl-strip-words">Reading the paper</p>
      ) : (
        <Compartments
          compartments={compartments}
          active={active?.id ?? null}
          macros={macros}
          onPoint={(offer) => setPointed(offer.id)}
          onSet={set}
        />
      )}
      <Foot query={query} active={active} found={wanted.length} macros={macros} />
    </div>
  );
}

const NO_MACROS = {};
const ARROWS: ReadonlySet<string> = new Set(["ArrowUp", "ArrowDown", "ArrowLeft", "ArrowRight"]);

interface FootProps {
  readonly query: string;
  readonly active: Offer | null;
  readonly found: number;
  readonly macros: Readonly<Record<string, string>>;
}

/** What is chosen, in full, and how it will be written. */
function Foot({ query, active, found, macros }: FootProps) {
  if (active === null) {
    const none = query.trim() !== "" && found === 0;
    return (
      <p className="hl-case-foot" role={none ? "status" : undefined}>
        {none
          ? "Nothing here is called that. A kind of cell, a result, a label or a name of the bibliography would be found."
          : "Everything keeps its place here, so that the hand learns it."}
      </p>
    );
  }
  return (
    <p className="hl-case-foot">
      <span>
        <b>{active.title}</b>
        {active.here === "" ? "" : ` ${active.here}`}: <Words words={active.words} macros={macros} />
      </span>
      <span className="hl-case-source">{sourceWords(active)}</span>
    </p>
  );
}

/** "```tail T2, 5 lines" */
function sourceWords({ setting }: Offer): string {
  if (setting.set === "number") return `:value[${setting.formula}]`;
  if (setting.set === "footnote") return `[^${setting.label}]`;
  const [first = "", ...more] = setting.text.split("\n");
  const words = first.replace(/^`+/, "");
  return more.length === 0 ? words : `${words}, ${counted(more.length + 1, "line")}`;
}

function lineOf({ view }: SheetAtHand, active: Offer | null): number {
  const caret = caretOf(view);
  if (active === null) return view.state.doc.lineAt(caret).number;
  return lay(view.state.doc.toString(), caret, active.setting).line;
}

function boxOf({ id }: Offer) {
  const box = document.getElementById(offerElementId(id))?.getBoundingClientRect();
  return box ?? { left: 0, right: 0, top: 0, bottom: 0 };
}
