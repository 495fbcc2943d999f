import "./quoting.css";
import { useEffect, useRef, useState } from "react";
import { createPortal } from "react-dom";
import { Command } from "../../ui/index.ts";
import { Value } from "../case/compartments.tsx";
import { lay } from "../case/lay.ts";
import { caretOf } from "../case/set-offer.ts";
import { quoteRefused, quoteValue } from "../keys/quote.ts";
import type { SheetAtHand } from "../keys/types.ts";
import type { CellWords } from "../model/knowledge.ts";
import type { ValueNow } from "../model/messages.ts";
import { useDeskView } from "../parts/use-desk-view.ts";
import { QuoteLayer } from "./layer.tsx";
import type { QuotePlace } from "./places.ts";
import { columnOf, useQuotePlaces } from "./use-places.ts";

/** What is pointed at. */
interface Pointed {
  readonly formula: string;
  readonly slot: string;
}

/** A value is quoted by pointing at it: on the sheet, where figures and tables become places, or by its cell's name here. */
export function QuoteStrip({ sheet }: { readonly sheet: SheetAtHand }) {
  const { desk, view } = sheet;
  const model = useDeskView(desk, (shown) => shown.model);
  const places = useQuotePlaces(view, model);
  const [pointed, setPointed] = useState<Pointed | null>(null);
  const [cell, setCell] = useState("");
  const value = useValue(sheet, pointed?.formula ?? "");
  useKeysToNearest(sheet, places);
  const point = (formula: string, slot: string) => {
    setPointed({ formula, slot });
    const name = model?.cells.find((face) => face.slot === slot)?.name ?? "";
    if (name !== "") setCell(name);
  };
  const choose = (formula: string) => void quotePointed(sheet, formula);
  const cells = (model?.names.cells ?? []).filter(({ values }) => values.length > 0);
  const column = columnOf(view);
  const show = (words: CellWords) => {
    setCell(words.name);
    const face = model?.cells.find(({ name }) => name === words.name);
    if (face !== undefined) desk.show(face.from);
  };
  return (
    <>
      {column === null ? null : createPortal(<QuoteLayer places={places} onPoint={point} onChoose={choose} />, column)}
      <p className="hl-quote-words">
        {pointed === null ? (
          "Point at a number of a table or at a curve: press it, or go there with Tab and the arrows and press Enter."
        ) : (
          <>
            <code>{pointed.formula}</code> {value === null ? null : <b>{<Value value={value} />}</b>}
            <span> {value === null || value.reason === "" ? lineWords(sheet, pointed.formula) : value.reason}</span>
          </>
        )}{" "}
        {quoteRefused(view) === "" ? (
          <Command
            onClick={() => {
              sheet.strips.set({ open: null });
              quoteValue(desk, view);
            }}
          >
            Write the formula
          </Command>
        ) : null}
      </p>
      <ul className="hl-quote-cells" aria-label="Cells">
        {cells.map((words) => (
          <li key={words.name}>
            <Command aria-pressed={words.name === cell} onClick={() => show(words)} title={words.title}>
              {words.name}
            </Command>
          </li>
        ))}
      </ul>
      <CellValues
        sheet={sheet}
        cell={cells.find(({ name }) => name === cell) ?? null}
        onPoint={point}
        onChoose={choose}
      />
    </>
  );
}

interface ValuesProps {
  readonly sheet: SheetAtHand;
  readonly cell: CellWords | null;
  onPoint(formula: string, slot: string): void;
  onChoose(formula: string): void;
}

/** The values of one cell with what they are now. */
function CellValues({ sheet, cell, onPoint, onChoose }: ValuesProps) {
  const { desk } = sheet;
  const model = useDeskView(desk, (shown) => shown.model);
  const [values, setValues] = useState<readonly ValueNow[]>([]);
  useEffect(() => {
    let here = true;
    const formulas = cell?.values.map(({ name }) => `${cell.name}.${name}`) ?? [];
    // Asked again with each answer of the worker: what is shown may have changed.
    if (model !== null) void desk.valuesNow(formulas).then((now) => here && setValues(now));
    return () => {
      here = false;
    };
  }, [desk, cell, model]);
  const slot = model?.cells.find(({ name }) => name === cell?.name)?.slot ?? "";
  const whole = values.filter(({ reason, formula }) => reason === "" && formula.startsWith(`${cell?.name}.`));
  if (cell === null || whole.length === 0) return null;
  return (
    <ul className="hl-quote-values" aria-label={`Values of ${cell.title}`}>
      {whole.map((value) => (
        <li key={value.formula}>
          <Command
            title={cell.values.find(({ name }) => value.formula === `${cell.name}.${name}`)?.meaning}
            onFocus={() => onPoint(value.formula, slot)}
            onClick={() => onChoose(value.formula)}
          >
            {value.formula.slice(cell.name.length + 1).replaceAll("_", " ")}
          </Command>{" "}
          <Value value={value} />
        </li>
      ))}
    </ul>
  );
}

/** What a formula is now; null until it is known. */
function useValue({ desk }: SheetAtHand, formula: string): ValueNow | null {
  const [value, setValue] = useState<ValueNow | null>(null);
  useEffect(() => {
    if (formula === "") return;
    let here = true;
    void desk.valuesNow([formula]).then(([now]) => here && setValue(now ?? null));
    return () => {
      here = false;
    };
  }, [desk, formula]);
  return value?.formula === formula ? value : null;
}

/** The keys go to the place that lies nearest to the caret, once there is one; from there Tab and the arrows lead on. */
function useKeysToNearest({ view }: SheetAtHand, places: readonly QuotePlace[]): void {
  const given = useRef(false);
  useEffect(() => {
    const column = columnOf(view);
    if (given.current || places.length === 0 || column === null) return;
    given.current = true;
    const caret = view.coordsAtPos(view.state.selection.main.head)?.top ?? window.innerHeight / 2;
    const from = caret - column.getBoundingClientRect().top;
    const far = places.map(({ top, height }) => Math.abs(top + height / 2 - from));
    const made = column.querySelectorAll<HTMLElement>(".hl-quote-layer > *")[far.indexOf(Math.min(...far))];
    const target = made?.matches("button") === true ? made : made?.querySelector<HTMLElement>("[role=slider]");
    target?.focus();
  }, [view, places]);
}

function lineWords({ view }: SheetAtHand, formula: string): string {
  const { line } = lay(view.state.doc.toString(), caretOf(view), { set: "number", formula, select: null });
  return `to be quoted in line ${line}.`;
}

/** Quotes a formula where the caret is, which it comes to stand after. */
async function quotePointed({ desk, view, strips }: SheetAtHand, formula: string): Promise<void> {
  const { changes, select, line } = lay(view.state.doc.toString(), caretOf(view), {
    set: "number",
    formula,
    select: null,
  });
  desk.edit({ changes, selection: { anchor: select.to }, scrollIntoView: true, userEvent: "input.quote" });
  strips.set({ open: null });
  view.focus();
  const [now] = await desk.valuesNow([formula]);
  const digits = now === undefined || now.reason !== "" ? "" : `, ${now.known}${now.unknown}${now.rest},`;
  desk.tell(`${formula}${digits} is quoted in line ${line}.`);
}
