import {
  type CellResult,
  type CellState,
  cellState,
  computePlan,
  type Outcome,
  type Plan,
  type PlannedCell,
  planPaper,
  quickCells,
  type ShownPaper,
} from "../../cells/index.ts";
import { type Paper, readPaper } from "../../paper/index.ts";
import type { TextEdit, ToWorker, ValueNow } from "../model/messages.ts";
import type { SheetModel } from "../model/types.ts";
import type { Ground } from "./border-finder.ts";
import { type CellTelling, cellFaces, cellNodesOf, titlesOf } from "./cell-faces.ts";
import { errataOf } from "./errata.ts";
import { frontFace, frontPieces } from "./front-face.ts";
import { LANGUAGE_WORDS, namesOf } from "./knowledge.ts";
import { type CellStanding, numberFaces } from "./number-faces.ts";
import { parameterFaces, parameterPieces } from "./parameter-faces.ts";
import { byPlace, editBetween, PieceStore } from "./piece-store.ts";
import { collectPieces } from "./pieces.ts";
import { bibliographyFaces, problemFaces } from "./problem-faces.ts";
import { ResultStore } from "./result-store.ts";
import { valueNow } from "./value-now.ts";
import { ViewStore } from "./view-store.ts";

type Overrides = Readonly<Record<string, string>>;

interface Drawn {
  readonly plan: Plan;
  readonly results: ReadonlyMap<string, CellResult>;
}

/**
 * All that the page's worker holds of a paper: its text, what it shows, the results, and what is tried privately.
 * `hear` takes in; `sheet` draws up the whole sheet from it. Steps whose ground has not changed are not done again:
 *
 *     text ──read──▶ paper ──plan──▶ plan ─┬─ states of cells ──▶ faces, numbers, pieces
 *     shown, results, private trial ───────┘
 */
export class SheetReader {
  private version = 0;
  private text = "";
  private bibliography = "";
  private paper: Paper | null = null;
  private shown: ShownPaper = { cells: new Map(), work: new Map(), changes: new Map() };
  private settled: Overrides = {};
  private trial: Overrides = {};
  private readonly plans = new Map<string, Plan>();
  private readonly results = new ResultStore();
  private readonly views = new ViewStore();
  private readonly pieces = new PieceStore();
  /** The answer whose pieces the page has. */
  private have = 0;
  /** What the last sheet was drawn up from. */
  private drawn: Drawn | null = null;

  hear(message: ToWorker, have = 0): void {
    this.have = have;
    switch (message.tell) {
      case "text":
        this.hearText(message.version, message.text, message.bibliography, [editBetween(this.text, message.text)]);
        return;
      case "ahead":
        this.hearText(0, message.text, message.bibliography, []);
        this.paper ??= readPaper(message.text, message.bibliography);
        return;
      case "edits":
        this.hearText(message.version, edited(this.text, message.edits), message.bibliography, message.edits);
        return;
      case "shown":
        this.shown = {
          cells: new Map(Object.entries(message.cells)),
          work: new Map(Object.entries(message.work)),
          changes: new Map(Object.entries(message.changes)),
        };
        return;
      case "results":
        for (const result of message.results) this.results.keep(result);
        return;
      case "preview":
        this.settled = message.settled;
        this.trial = message.trial;
        return;
      case "values":
        return;
    }
  }

  private hearText(version: number, text: string, bibliography: string, edits: readonly TextEdit[]): void {
    this.version = version;
    this.pieces.move(edits);
    if (text === this.text && bibliography === this.bibliography) return;
    this.text = text;
    this.bibliography = bibliography;
    this.paper = null;
    this.plans.clear();
  }

  /** The sheet as of now. */
  sheet(): SheetModel {
    this.paper ??= readPaper(this.text, this.bibliography);
    const { paper } = this;
    const tried = { ...this.settled, ...this.trial };
    const names = new Set(Object.keys(tried));
    const plan = this.planWith(paper, tried);
    const trials = names.size > 0 ? this.tryOut(plan) : new Map<string, Outcome>();
    const tellings = plan.cells.map((planned) => this.tellingOf(planned, plan, trials.get(planned.id)));
    const results = new Map(
      tellings.flatMap(({ planned, result }) => (result === undefined ? [] : [[planned.id, result]])),
    );
    this.drawn = { plan, results };
    const nodes = cellNodesOf(paper);
    const titles = titlesOf(plan, nodes);
    const standings = new Map<string, CellStanding>();
    for (const { planned, state, previewed, awaited } of tellings) {
      const title = titles.get(planned.id) ?? planned.id;
      standings.set(planned.id, { state: previewed ? "preview" : awaited ? "computing" : state.state, title });
    }
    const numbers = numberFaces(plan, results, standings, names);
    // The rule shows by itself what is under the hand; in the model its parameter stays as it was.
    const resting = Object.keys(this.trial).length === 0 ? plan : this.planWith(paper, this.settled);
    const cells = cellFaces(tellings, { plan, nodes, titles, numbers, tried: names });
    const front = frontFace(paper, numbers);
    const problems = problemFaces(paper, plan);
    const pieces = [...frontPieces(front), ...parameterPieces(resting), ...collectPieces(paper, numbers)].sort(byPlace);
    return {
      version: this.version,
      front,
      macros: paper.front.macros,
      pieces: this.pieces.since(this.have, pieces),
      parameters: parameterFaces(resting, tellings, { cells, numbers: paper.numbers.map(numbers.face) }),
      cells,
      views: this.views.changed(plan, results, cells),
      problems,
      bibliography: bibliographyFaces(paper),
      wanted: this.results.missing(tellings.map(({ shown: of }) => of?.key)),
      errata: errataOf(cells, pieces, problems, paper.text),
      words: LANGUAGE_WORDS,
      names: namesOf(paper, resting, titles),
      preview: names.size > 0,
    };
  }

  /** What formulas are on the sheet as it was last drawn up. */
  values(formulas: readonly string[]): ValueNow[] {
    const { drawn } = this;
    return drawn === null ? [] : formulas.map((formula) => valueNow(formula, drawn.plan, drawn.results));
  }

  /** What the search for borders of the parameters needs; null while one is under the hand. */
  ground(): Ground | null {
    const { paper, settled: overrides } = this;
    if (paper === null || Object.keys(this.trial).length > 0) return null;
    const plan = this.planWith(paper, overrides);
    const titles = titlesOf(plan, cellNodesOf(paper));
    return { paper, plan, overrides, titles, known: (key) => this.results.any(key) };
  }

  /** What is to be told of a cell: the paper's own state and result, or those of a private trial. */
  private tellingOf(planned: PlannedCell, plan: Plan, trial: Outcome | undefined): CellTelling {
    const { shown } = this;
    const of = shown.cells.get(planned.slot);
    const work = shown.work.get(planned.slot);
    const state = cellState(planned, of, work, plan, shown);
    const kept = this.results.shown(of?.key) ?? this.results.last(planned.slot);
    if (kept !== undefined) this.results.showing(planned.slot, kept);
    const awaited = of !== undefined && kept?.key !== of.key;
    if (trial?.status === "computed") {
      return {
        planned,
        shown: of,
        work,
        state,
        result: trial.result,
        previewed: trial.result.key !== of?.key,
        awaited: false,
      };
    }
    if (trial?.status === "failed") {
      const failed: CellState = { ...state, state: "failed", causes: [], failure: trial.failure };
      return { planned, shown: of, work, state: failed, result: kept, previewed: false, awaited };
    }
    return { planned, shown: of, work, state, result: kept, previewed: false, awaited };
  }

  private planWith(paper: Paper, overrides: Overrides): Plan {
    const sign = JSON.stringify(overrides);
    const known = this.plans.get(sign);
    if (known !== undefined) return known;
    // A drag passes through many values: the plans of those gone by are not needed again.
    if (this.plans.size > 4) this.plans.clear();
    const plan = planPaper(paper, { overrides });
    this.plans.set(sign, plan);
    return plan;
  }

  /** Computes here, for this page alone, what takes milliseconds and reads only such; nothing of it is kept elsewhere. */
  private tryOut(plan: Plan): ReadonlyMap<string, Outcome> {
    const only = [...quickCells(plan)];
    const outcomes = computePlan(plan, { known: (key) => this.results.any(key), only });
    for (const outcome of outcomes.values()) if (outcome.status === "computed") this.results.keepTrial(outcome.result);
    return outcomes;
  }
}

/** A text after edits. */
function edited(text: string, edits: readonly TextEdit[]): string {
  let after = "";
  let at = 0;
  for (const { from, to, insert } of edits) {
    after += text.slice(at, from) + insert;
    at = to;
  }
  return after + text.slice(at);
}
