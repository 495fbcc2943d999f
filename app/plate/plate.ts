import type { CellResult, CellView, PlannedCell } from "../cells/index.ts";
import { evaluateNumber, figureReadings, KINDS, viewCell } from "../cells/index.ts";
import type { CurveReadings, Figure } from "../figures/index.ts";
import { type PrintedNumber, printNumber } from "../formulas/index.ts";
import { type GalleyPaperProps, type PlateMarkup, renderPlate } from "../galley/index.ts";
import { renderMath } from "../ui/math.ts";

/** One cell of a paper with what it shows. */
export interface Plate {
  readonly planned: PlannedCell;
  readonly result: CellResult;
  readonly view: CellView;
  readonly markup: PlateMarkup;
  /** "Figure 1", or "Process larvae" for a cell that prints nothing. */
  readonly title: string;
  /** Parameters that the shown result was computed with, as the paper writes them. */
  readonly parameters: Readonly<Record<string, string>>;
}

/** The cell of that id with its result, or why there is no plate of it. */
export function findPlate(printed: GalleyPaperProps, cellId: string): Plate | { readonly absent: string } {
  const planned = printed.plan.byId.get(cellId);
  const markup = planned === undefined ? null : renderPlate(printed, planned.id);
  if (planned === undefined || markup === null) return { absent: `This paper has no cell \`${cellId}\`.` };
  const result = printed.results.get(planned.id);
  if (result === undefined) return { absent: `\`${planned.id}\` has no result yet. Recompute it on the sheet first.` };
  const label = KINDS.get(planned.kind)?.documentation.label ?? planned.kind;
  return {
    planned,
    result,
    markup,
    view: viewCell(planned, result, printed.plan, printed.results),
    title: markup.title ?? `${label} ${planned.cell.name ?? `in line ${planned.line}`}`,
    parameters: printed.shown.cells.get(planned.slot)?.parameterValues ?? planned.parameterValues,
  };
}

/** A plate as its page shows it: plain JSON, formulas and tables set as HTML of our making. */
export interface PlateFace {
  readonly cell: string;
  readonly line: number;
  readonly title: string;
  readonly figure: Figure | null;
  /** Of the figure's curves, in the order in which they are placed. */
  readonly readings: readonly CurveReadings[];
  readonly markup: PlateMarkup;
  readonly values: readonly PlateValue[];
  readonly parameters: readonly PlateParameter[];
  readonly quotations: readonly Quotation[];
}

/** A value beside its plate: `printed` is null where it is no number; `words` then say what it is, or why there is none. */
export interface PlateValue {
  readonly name: string;
  readonly meaning: string;
  readonly printed: PrintedNumber["sheet"] | null;
  readonly words: string;
  /** What a sentence quotes it by; "" where there is nothing to quote. */
  readonly quote: string;
}

export interface PlateParameter {
  readonly name: string;
  readonly note: string;
  readonly html: string;
}

/** A line of the text that quotes the cell. */
export interface Quotation {
  readonly line: number;
  readonly formula: string;
}

export function plateFace(plate: Plate, printed: GalleyPaperProps): PlateFace {
  const { planned, title, view, markup } = plate;
  return {
    cell: planned.id,
    line: planned.line,
    title,
    figure: view.figure,
    readings: view.figure ? figureReadings(view.figure) : [],
    markup,
    values: valuesOf(plate),
    parameters: parametersOf(plate, printed),
    quotations: quotationsOf(plate, printed),
  };
}

const DIGITS = 12;

function valuesOf({ planned, result }: Plate): PlateValue[] {
  const documented = KINDS.get(result.kind)?.documentation.values ?? [];
  return Object.entries(result.values).map(([name, value]) => {
    const meaning = documented.find((one) => one.name === name)?.meaning ?? "";
    const quote = planned.cell.name === null ? "" : `:value[${planned.cell.name}.${name}]`;
    if (value.type === "number") {
      const { error, se } = value.quantity;
      const digits = error === 0 && se === 0 ? {} : { digits: DIGITS };
      return { name, meaning, quote, words: "", printed: printNumber(value.quantity, digits).sheet };
    }
    if (value.type === "refused") return { name, meaning, quote: "", words: value.reason, printed: null };
    return { name, meaning, quote, words: value.type === "text" ? value.text : "", printed: null };
  });
}

function parametersOf({ parameters }: Plate, { plan, paper }: GalleyPaperProps): PlateParameter[] {
  return plan.parameters
    .filter(({ name }) => Object.hasOwn(parameters, name))
    .map(({ name, symbol, note }) => ({
      name,
      note,
      html: renderMath(`${symbol} = ${parameters[name] ?? ""}`, false, paper.front.macros),
    }));
}

/** Each once, in the order of the text. */
function quotationsOf({ planned }: Plate, { paper, plan, results }: GalleyPaperProps): Quotation[] {
  const quoting = paper.numbers.filter((number) => evaluateNumber(number, plan, results).needs.includes(planned.id));
  const unique = new Map(
    quoting.map(({ span, formula }) => [`${span.line} ${formula}`, { line: span.line, formula }] as const),
  );
  return [...unique.values()];
}
