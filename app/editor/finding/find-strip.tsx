import { useEffect, useRef, useState, useSyncExternalStore } from "react";
import { Command } from "../../ui/index.ts";
import type { SheetAtHand } from "../keys/types.ts";
import { counted } from "../parts/words.ts";
import { type Found, foundField, watchFound } from "../text/found.ts";
import { MOST_MATCHES, type Sought } from "../text/sought.ts";
import { InBibtex } from "./in-bibtex.tsx";
import { endSearch, goToMatch, replaceAll, replaceHere, seek } from "./walk-found.ts";

const FIRST: Sought = { words: "", matchCase: false, wholeWords: false, isPattern: false };

/** How long typing rests before the count is said, in ms. */
const REST_MS = 700;

/** Finds and replaces over the whole paper, sources that are typeset included: what is found opens. */
export function FindStrip({ sheet }: { readonly sheet: SheetAtHand }) {
  const { desk, view } = sheet;
  const [sought, setSought] = useState<Sought>(() => ({ ...FIRST, words: chosenWords(sheet) }));
  const [replacement, setReplacement] = useState("");
  const begun = useRef(view.state.selection.main.from);
  const found = useSyncExternalStore(
    (onChange) => watchFound(view, onChange),
    () => view.state.field(foundField),
  );
  useEffect(() => seek(view, sought, begun.current), [view, sought]);
  useEffect(
    () => () => {
      const wasAt = view.state.field(foundField).here;
      endSearch(view);
      if (wasAt !== null) view.focus();
    },
    [view],
  );
  const words = foundWords(found);
  useEffect(() => {
    const timer = setTimeout(() => words !== "" && desk.say(words), REST_MS);
    return () => clearTimeout(timer);
  }, [desk, words]);
  const step = (direction: 1 | -1) => {
    goToMatch(view, direction);
    begun.current = view.state.selection.main.from;
  };
  const replaceEvery = () => {
    const count = replaceAll(desk, view, replacement);
    desk.tell(
      count === 0 ? "There was nothing to replace." : `${counted(count, "place")} replaced, as one step to undo.`,
    );
  };
  return (
    <form
      className="hl-find"
      onSubmit={(event) => {
        event.preventDefault();
        step(1);
      }}
    >
      <div className="hl-find-line">
        <label>
          Find{" "}
          <input
            data-first
            className="hl-strip-field"
            value={sought.words}
            // What was chosen in the text is looked for at once, and typing takes its place.
            onFocus={({ target }) => target.select()}
            onChange={({ target }) => setSought({ ...sought, words: target.value })}
            onKeyDown={(event) => {
              if (event.key !== "Enter" || !event.shiftKey) return;
              event.preventDefault();
              step(-1);
            }}
            autoComplete="off"
            spellCheck={false}
          />
        </label>
        <Command type="submit">Next</Command>
        <Command onClick={() => step(-1)}>Previous</Command>
        <span className={found.fault === "" ? "hl-strip-count" : "hl-amiss"}>{words}</span>
        <InBibtex sheet={sheet} sought={sought} />
      </div>
      <div className="hl-find-line">
        <Tick name="Match case" on={sought.matchCase} onTurn={(matchCase) => setSought({ ...sought, matchCase })} />
        <Tick name="Whole words" on={sought.wholeWords} onTurn={(wholeWords) => setSought({ ...sought, wholeWords })} />
        <Tick
          name="Regular expression"
          on={sought.isPattern}
          onTurn={(isPattern) => setSought({ ...sought, isPattern })}
        />
      </div>
      {sheet.writes ? (
        <div className="hl-find-line">
          <label>
            Replace with{" "}
            <input
              className="hl-strip-field"
              value={replacement}
              onChange={({ target }) => setReplacement(target.value)}
              autoComplete="off"
              spellCheck={false}
            />
          </label>
          <Command disabled={found.here === null} onClick={() => replaceHere(desk, view, replacement)}>
            Replace
          </Command>
          <Command disabled={found.matches.length === 0} onClick={replaceEvery}>
            Replace all
          </Command>
        </div>
      ) : null}
    </form>
  );
}

interface TickProps {
  readonly name: string;
  readonly on: boolean;
  onTurn(on: boolean): void;
}

function Tick({ name, on, onTurn }: TickProps) {
  return (
    <label className="hl-tick">
      <input type="checkbox" checked={on} onChange={({ target }) => onTurn(target.checked)} /> {name}
    </label>
  );
}

/** "3 of 17", "not found", or what is wrong with the pattern. */
export function foundWords({ sought, matches, here, more, fault }: Omit<Found, "marks">): string {
  if (sought === null || sought.words === "") return "";
  if (fault !== "") return fault;
  if (matches.length === 0) return "not found";
  const all = more ? `more than ${MOST_MATCHES}` : String(matches.length);
  return here === null ? `${all} found` : `${matches.indexOf(here) + 1} of ${all}`;
}

/** A few words that are chosen in the text are what one looks for. */
function chosenWords({ view }: SheetAtHand): string {
  const { from, to } = view.state.selection.main;
  const chosen = view.state.sliceDoc(from, Math.min(to, from + LONGEST_CHOSEN + 1));
  return chosen.length <= LONGEST_CHOSEN && !chosen.includes("\n") ? chosen : "";
}

const LONGEST_CHOSEN = 80;
