import {
  type CellResult,
  type CellState,
  type CellView,
  causeWords,
  cellState,
  evaluateNumber,
  type Finding,
  findingOf,
  KINDS,
  type Plan,
  type PlannedCell,
  type Provenance,
  provenance,
  type ShownCell,
  type ShownPaper,
  viewCell,
} from "../cells/index.ts";
import type { PrintedNumber } from "../formulas/index.ts";
import type { BoundNumber, Cell, Paper } from "../paper/index.ts";

/** A number as it is set: `printed` is null where there is no value (‡), and `reason` says why. */
export interface SetNumber {
  readonly printed: PrintedNumber | null;
  readonly reason: string;
  /** What its result was set with, when that is out of date (†). */
  readonly note: Note | null;
}

/** A footnote to all that is out of date for one and the same reason. */
export interface Note {
  /** "†" for the first, "††" for the second, … */
  readonly mark: string;
  /** Markdown with math: "Set with $\mu$ = 1.90; $\mu$ is now 2.00". */
  readonly words: string;
}

/** A cell as it is set. */
export interface SetCell {
  readonly planned: PlannedCell | null;
  readonly state: CellState["state"];
  /** null where there is no result to show. */
  readonly view: CellView | null;
  readonly note: Note | null;
  /** Why there is no result; "" when there is one. */
  readonly reason: string;
  readonly provenance: Provenance | null;
  /** What its result says of itself. */
  readonly finding: Finding | null;
}

export interface SetPaper {
  readonly paper: Paper;
  number(number: BoundNumber): SetNumber;
  cell(cell: Cell): SetCell;
  /** Every note of the paper, in order of first use. */
  readonly notes: readonly Note[];
}

/** Without times and names: a printed page is read by people in other places and other years. */
const PRINTED_CAUSE = { symbol: (tex: string) => `$${tex}$`, time: () => "" };

/**
 * Puts a paper, its plan and the results at hand together.
 * @param results by id of the cell: of this plan, or of an earlier one where a result is out of date
 * @param shown who computed what, and with which parameters
 */
export function setPaper(
  paper: Paper,
  plan: Plan,
  results: ReadonlyMap<string, CellResult>,
  shown: ShownPaper,
): SetPaper {
  const notes = new Map<string, Note>();
  const cells = new Map<string, SetCell>();
  const numbers = new Map<BoundNumber, SetNumber>();

  const noteOf = (words: string): Note => {
    const known = notes.get(words);
    if (known) return known;
    const note: Note = { mark: "†".repeat(notes.size + 1), words };
    notes.set(words, note);
    return note;
  };
  const cellOf = (id: string): SetCell => {
    const known = cells.get(id);
    if (known) return known;
    const made = setCell(plan.byId.get(id), plan, results, shown, noteOf);
    cells.set(id, made);
    return made;
  };
  const numberOf = (number: BoundNumber): SetNumber => {
    const known = numbers.get(number);
    if (known) return known;
    const { printed, needs, problem } = evaluateNumber(number, plan, results);
    const read = needs.map(cellOf);
    const broken = read.find((cell) => cell.state === "failed");
    const made: SetNumber =
      broken || printed === null
        ? { printed: null, reason: broken?.reason || (problem ?? "There is no value."), note: null }
        : { printed, reason: "", note: read.find((cell) => cell.note !== null)?.note ?? null };
    numbers.set(number, made);
    return made;
  };

  for (const number of paper.numbers) numberOf(number);
  for (const cell of paper.cells) cellOf(cell.id);
  return { paper, number: numberOf, cell: (cell) => cellOf(cell.id), notes: [...notes.values()] };
}

function setCell(
  planned: PlannedCell | undefined,
  plan: Plan,
  results: ReadonlyMap<string, CellResult>,
  shown: ShownPaper,
  noteOf: (words: string) => Note,
): SetCell {
  if (!planned) {
    return {
      planned: null,
      state: "failed",
      view: null,
      note: null,
      reason: "This cell could not be read.",
      provenance: null,
      finding: null,
    };
  }
  const result = results.get(planned.id);
  const shownCell = shown.cells.get(planned.slot) ?? (result && shownFrom(planned, result));
  const state = cellState(planned, shownCell, shown.work.get(planned.slot), plan, shown);
  if (!result)
    return {
      planned,
      state: state.state,
      view: null,
      note: null,
      reason: reasonOf(state, planned),
      provenance: null,
      finding: null,
    };
  const causes = state.state === "failed" ? [] : state.causes;
  const words = [...new Set(causes.map((cause) => causeWords(cause, PRINTED_CAUSE)).map(withoutBrackets))];
  return {
    planned,
    state: state.state,
    view: viewCell(planned, result, plan, results),
    note: words.length > 0 ? noteOf(`${words.join(". ")}.`) : null,
    reason: state.state === "failed" ? reasonOf(state, planned) : "",
    provenance: provenance(planned, result, shownCell),
    finding: findingOf(planned, result, plan),
  };
}

/** "(Tormod, )": who changed a parameter belongs on the desk, not into print. */
const withoutBrackets = (words: string) => words.replace(/ \([^()]*\)$/, "");

function reasonOf(state: CellState, planned: PlannedCell): string {
  if (state.failure) return state.failure.message;
  if (state.waitsFor.length > 0) return `It needs ${state.waitsFor.map((id) => `\`${id}\``).join(" and ")}.`;
  return `\`${planned.id}\` has no result.`;
}

/** A result that nobody asked for by name: computed for this one setting, on the command line or in a test. */
function shownFrom(planned: PlannedCell, result: CellResult): ShownCell {
  return {
    key: result.key,
    at: "",
    by: "",
    seconds: result.seconds,
    solver: result.solver,
    parameterValues: result.key === planned.key ? planned.parameterValues : {},
    workingKey: planned.workingKey ?? "",
  };
}

/** What a cell is called where its result is spoken of: "Check few". */
export function cellTitle({ planned }: SetCell): string {
  if (planned === null) return "Cell";
  const label = KINDS.get(planned.kind)?.documentation.label ?? planned.kind;
  return planned.cell.name === null ? label : `${label} ${planned.cell.name}`;
}

/** What somebody who sends a paper to print should know first. */
export interface Doubts {
  /** Numbers and printed cells whose result is out of date. */
  readonly outOfDate: number;
}

export function doubtsOf(set: SetPaper): Doubts {
  const numbers = set.paper.numbers.filter((number) => set.number(number).note !== null).length;
  const cells = set.paper.cells
    .map((cell) => set.cell(cell))
    .filter((cell) => cell.note !== null && (cell.planned?.show.length ?? 0) > 0);
  return { outOfDate: numbers + cells.length };
}

const MONTHS = ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"];

/**
 * The provenance line: "Slit contour, 310 nodes; D = 0.5; halfline 1; 4 ms · Inês, 1 Dec 2026, 14:31 UTC". In UTC, since
 * neither the server nor a printed page knows the reader's own time.
 */
export function provenanceLine(set: SetCell): string {
  const { before, moment } = provenanceParts(set);
  return `${before}${moment?.words ?? ""}`;
}

/** The provenance line up to its moment, and the moment by itself: as ISO 8601, and in words of UTC. */
export interface ProvenanceParts {
  readonly before: string;
  readonly moment: { readonly iso: string; readonly words: string } | null;
}

export function provenanceParts({ provenance: known }: SetCell): ProvenanceParts {
  if (!known || known.words === "") return { before: "", moment: null };
  const words = known.at === null ? "" : utcWords(known.at);
  const by = known.by ?? "";
  const before = `${known.words}${by === "" && words === "" ? "" : ` · ${by}`}${by !== "" && words !== "" ? ", " : ""}`;
  return { before, moment: known.at === null || words === "" ? null : { iso: known.at, words } };
}

function utcWords(iso: string): string {
  const time = new Date(iso);
  if (Number.isNaN(time.getTime())) return "";
  return `${time.getUTCDate()} ${MONTHS[time.getUTCMonth()]} ${time.getUTCFullYear()}, ${time.toISOString().slice(11, 16)} UTC`;
}
