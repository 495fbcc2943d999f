import { ChangeSet, type Text } from "@codemirror/state";
import type { EditorView, ViewUpdate } from "@codemirror/view";
import type { CellResult } from "../../cells/index.ts";
import type { Borders } from "../model/borders.ts";
import type { FromWorker, TextEdit, Told, ToWorker, ValueNow } from "../model/messages.ts";
import { unpackSheet } from "../model/packing.ts";
import type { SheetModel } from "../model/types.ts";
import { glossField, setProblems } from "../text/glosses.ts";
import { applyModel, sheetField } from "../text/sheet-field.ts";
import type { ShownRecords } from "./paper-session.ts";
import { showsTheSame } from "./same-sheet.ts";

/** The part of a Worker that reading needs; a test gives its own. */
export interface Reader {
  postMessage(told: Told): void;
  onmessage: ((event: MessageEvent<FromWorker>) => void) | null;
  terminate(): void;
}

/** How long after a keystroke the text is given to the worker, in ms: a burst is read once. */
const GATHER_MS = 20;
/** Between two questions, in ms, however fast one types, and others with one. */
const BETWEEN_MS = 100;
/** How long the writing must rest before faults of the text are pointed out, in ms. */
const REST_MS = 700;

/**
 * The page's side of reading. At most one text is with the worker; while it is, changes are composed, and the answer
 * is moved through them, so that fast typing is never without its typeset sheet.
 */
export class Reading {
  private readonly view: EditorView;
  private readonly reader: Reader;
  private readonly bibliography: () => string;
  private readonly onModel: (model: SheetModel) => void;
  private readonly onBorders: (borders: Borders) => void;
  private version = 0;
  /** Messages that are not answered yet. */
  private open = 0;
  private stale = false;
  private asked: { doc: Text; since: ChangeSet };
  private model: SheetModel | null = null;
  /** The pieces on the sheet, of the answer `drawn`, are those of the later answer `heard` as well. */
  private same = { drawn: 0, heard: 0 };
  private timer: ReturnType<typeof setTimeout> | undefined;
  private rest: ReturnType<typeof setTimeout> | undefined;
  private typedAt = 0;
  private askedAt = Number.NEGATIVE_INFINITY;
  /** A newest-only message that waits for the answer at hand: a private trial. */
  private nextPreview: ToWorker | null = null;
  /** Who waits for values, by the number of the question. */
  private readonly waiting = new Map<number, (values: readonly ValueNow[]) => void>();
  private questions = 0;

  constructor(
    view: EditorView,
    reader: Reader,
    bibliography: () => string,
    onModel: (model: SheetModel) => void,
    onBorders: (borders: Borders) => void = () => undefined,
  ) {
    this.onBorders = onBorders;
    this.view = view;
    this.reader = reader;
    this.bibliography = bibliography;
    this.onModel = onModel;
    this.asked = { doc: view.state.doc, since: ChangeSet.empty(view.state.doc.length) };
    reader.onmessage = ({ data }) => this.hear(data);
    this.ask();
  }

  /** To be called with every update of the view. */
  onUpdate(update: ViewUpdate): void {
    if (!update.docChanged) return;
    this.asked.since = this.asked.since.compose(update.changes);
    this.typedAt = Date.now();
    this.textChanged();
  }

  /** The text or the bibliography has changed. */
  textChanged(): void {
    this.stale = true;
    if (this.timer !== undefined) return;
    this.timer = setTimeout(() => this.ask(), Math.max(GATHER_MS, this.askedAt + BETWEEN_MS - Date.now()));
  }

  tellShown(shown: ShownRecords): void {
    this.send({ tell: "shown", ...shown });
  }

  tellResults(results: readonly CellResult[]): void {
    this.send({ tell: "results", results });
  }

  /** Gives the text to the worker without waiting, if none is with it. */
  askNow(): void {
    if (this.stale) this.ask();
  }

  /** Tries parameters: `settled` are a visitor's own values, `trial` is under the hand right now. Newest only. */
  tellPreview(settled: Readonly<Record<string, string>>, trial: Readonly<Record<string, string>>): void {
    const message: ToWorker = { tell: "preview", settled, trial };
    if (this.open > 0) this.nextPreview = message;
    else this.send(message);
  }

  /** What formulas are on the sheet that is shown. */
  values(formulas: readonly string[]): Promise<readonly ValueNow[]> {
    this.questions += 1;
    const question = this.questions;
    return new Promise((resolve) => {
      this.waiting.set(question, resolve);
      this.reader.postMessage({ message: { tell: "values", question, formulas }, have: 0 });
    });
  }

  end(): void {
    for (const answer of this.waiting.values()) answer([]);
    this.waiting.clear();
    clearTimeout(this.timer);
    clearTimeout(this.rest);
    this.reader.onmessage = null;
    this.reader.terminate();
  }

  private ask(): void {
    clearTimeout(this.timer);
    this.timer = undefined;
    if (this.open > 0) return;
    this.stale = false;
    this.askedAt = Date.now();
    this.version += 1;
    const { doc } = this.view.state;
    const { version } = this;
    const bibliography = this.bibliography();
    const edits = editsOf(this.asked.since);
    this.asked = { doc, since: ChangeSet.empty(doc.length) };
    this.send(
      version === 1
        ? { tell: "text", version, text: doc.toString(), bibliography }
        : { tell: "edits", version, edits, bibliography },
    );
  }

  private send(message: ToWorker): void {
    this.open += 1;
    this.reader.postMessage({ message, have: this.have() });
  }

  /** Number of the newest answer whose pieces are on the sheet. */
  private have(): number {
    const { number } = this.view.state.field(sheetField);
    return number === this.same.drawn ? this.same.heard : number;
  }

  /** Puts an answer on the sheet, unless it brings nothing: a change of the view costs as much as a key. */
  private draw(model: SheetModel, before: SheetModel | null): void {
    const { number, met } = this.view.state.field(sheetField);
    const onHave = model.pieces.base === this.have();
    if (onHave && met.size === 0 && showsTheSame(before, model)) {
      this.same = { drawn: number, heard: model.pieces.number };
      return;
    }
    const pieces = onHave ? { ...model.pieces, base: number } : model.pieces;
    this.view.dispatch({ effects: applyModel.of({ model: { ...model, pieces }, ...this.asked }) });
  }

  private hear(message: FromWorker): void {
    this.open -= message.answers;
    if (message.tell === "sheet" && message.model.version === this.version) {
      const before = this.model;
      const model = unpackSheet(before, message.model);
      this.model = model;
      this.onModel(model);
      this.draw(model, before);
      this.showProblems(model);
    } else if (message.tell === "borders") {
      this.onBorders(message.borders);
    } else if (message.tell === "values") {
      this.waiting.get(message.question)?.(message.values);
      this.waiting.delete(message.question);
    } else if (message.tell === "fault") {
      console.error(`The sheet could not be read: ${message.message}`);
    }
    if (this.open > 0) return;
    // A trial's end must not be told before the text that it led to.
    if (this.stale && this.nextPreview !== null) this.ask();
    else if (this.stale) this.textChanged();
    if (this.nextPreview !== null) {
      const next = this.nextPreview;
      this.nextPreview = null;
      this.send(next);
    }
  }

  /** Faults wait until the writing rests: a word half written is not a fault. */
  private showProblems(model: SheetModel): void {
    clearTimeout(this.rest);
    if (model.problems.length === 0 && this.view.state.field(glossField).problems.length === 0) return;
    const wait = Math.max(0, this.typedAt + REST_MS - Date.now());
    const { asked } = this;
    const show = () => {
      if (asked !== this.asked || asked.since.newLength !== this.view.state.doc.length) return;
      const problems = model.problems.map((problem) => {
        const from = asked.since.mapPos(Math.min(problem.from, asked.doc.length), 1);
        return { ...problem, from, to: Math.max(from, asked.since.mapPos(Math.min(problem.to, asked.doc.length), -1)) };
      });
      this.view.dispatch({ effects: setProblems.of(problems) });
    };
    if (wait === 0) show();
    else this.rest = setTimeout(show, wait);
  }
}

function editsOf(changes: ChangeSet): TextEdit[] {
  const edits: TextEdit[] = [];
  changes.iterChanges((from, to, _fromNow, _toNow, inserted) => {
    edits.push({ from, to, insert: inserted.toString() });
  });
  return edits;
}
