import { refusal } from "../../access/index.server.ts";
import type { CellResult, CellView, PlannedCell } from "../../cells/index.ts";
import { evaluateNumber, KINDS, viewCell } from "../../cells/index.ts";
import { type PrintedNumber, printNumber } from "../../formulas/index.ts";
import { type PlateMarkup, renderPlate } from "../../galley/index.ts";
import type { PrintedPaper } from "./printed.server.ts";

/** One cell of a paper with what it shows. */
export interface Plate {
  readonly planned: PlannedCell;
  readonly result: CellResult;
  readonly view: CellView;
  readonly markup: PlateMarkup;
  /** "Figure 1", or "Process larvae" for a cell that prints nothing. */
  readonly title: string;
  /** Parameters that the shown result was computed with. */
  readonly parameters: Readonly<Record<string, string>>;
}

/** @throws Response 404 where the paper has no such cell, or the cell no result yet */
export function findPlate(printed: PrintedPaper, cellId: string | undefined): Plate {
  const planned = printed.plan.byId.get(cellId ?? "");
  const markup = planned && renderPlate(printed, planned.id);
  if (!planned || !markup) throw refusal(404, `This paper has no cell \`${cellId ?? ""}\`.`);
  const result = printed.results.get(planned.id);
  if (!result) throw refusal(404, `\`${planned.id}\` has no result yet. Recompute it on the sheet first.`);
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

/** A value beside its plate: `printed` is null where it is no number; `words` then say what it is, or why there is none. */
export interface PlateValue {
  readonly name: string;
  readonly meaning: string;
  readonly printed: PrintedNumber["sheet"] | null;
  readonly words: string;
  /** What a sentence quotes it by. */
  readonly quote: string;
}

const DIGITS = 12;

export function plateValues({ planned, result }: Plate): PlateValue[] {
  const documented = KINDS.get(result.kind)?.documentation.values ?? [];
  return Object.entries(result.values).map(([name, value]) => {
    const meaning = documented.find((one) => one.name === name)?.meaning ?? "";
    const quote = planned.cell.name === null ? "" : `:value[${planned.cell.name}.${name}]`;
    if (value.type === "number") {
      const digits = value.quantity.error === 0 && value.quantity.se === 0 ? {} : { digits: DIGITS };
      return { name, meaning, quote, words: "", printed: printNumber(value.quantity, digits).sheet };
    }
    if (value.type === "refused") return { name, meaning, quote: "", words: value.reason, printed: null };
    const words = value.type === "text" ? value.text : "";
    return { name, meaning, quote, words, printed: null };
  });
}

/** A line of the text that quotes the cell. */
export interface Quotation {
  readonly line: number;
  readonly formula: string;
}

/** Each once, in the order of the text. */
export function quotationsOf({ planned }: Plate, { paper, plan, results }: PrintedPaper): Quotation[] {
  const quoting = paper.numbers.filter((number) => evaluateNumber(number, plan, results).needs.includes(planned.id));
  const unique = new Map(
    quoting.map(({ span, formula }) => [`${span.line} ${formula}`, { line: span.line, formula }] as const),
  );
  return [...unique.values()];
}
