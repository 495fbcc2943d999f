import type { TransactionSpec } from "@codemirror/state";
import type { EditorView } from "@codemirror/view";
import type { CellResult } from "../../cells/index.ts";
import type { ValueNow } from "../model/messages.ts";
import { yamlScalar } from "../model/scale.ts";
import type { SheetModel } from "../model/types.ts";
import { createSheetEditor, createSourceEditor } from "../text/editor.ts";
import { type CellCommands, hostAtRest, type Offer, type SheetHost, takeSheet } from "../text/host.ts";
import { fetchMathFonts } from "../text/math-fonts.ts";
import { focusPlate, goToAddress, goToLine, goToPlace, showPlace, turnWorking } from "../text/moving.ts";
import { findPlace } from "../text/places.ts";
import { sheetField } from "../text/sheet-field.ts";
import { Announcer } from "./announcer.ts";
import type { Connection } from "./connection.ts";
import { type DeskView, FIRST_VIEW, TO_RECOMPUTE, TOLD_MS } from "./desk-view.ts";
import { openSession, type PaperSession, type SessionOptions, type ShownRecords } from "./paper-session.ts";
import { forgetPrivateCopies } from "./private-copies.ts";
import { Reading } from "./reading.ts";
import { requestsOf } from "./requests.ts";
import { ResultFetcher } from "./result-fetcher.ts";
import { createStore, type Store } from "./store.ts";

export type { DeskView } from "./desk-view.ts";

export interface DeskOptions extends Pick<SessionOptions, "paperId" | "person" | "writes" | "first"> {
  /** Gives the worker that reads the text; it is ended with the desk. */
  takeReader(): Worker;
}

/** Everything that belongs to one open paper: its session, its text on the sheet, its reading, and the commands. */
export class Desk {
  readonly store: Store<DeskView> = createStore<DeskView>(FIRST_VIEW);
  private readonly options: DeskOptions;
  private readonly session: PaperSession;
  private readonly host: SheetHost;
  private readonly announcer = new Announcer((heard) => this.store.set({ heard }));
  private readonly requests;
  private readonly fetcher: ResultFetcher;
  private readonly first: Promise<readonly CellResult[]>;
  /** The text on the sheet, once it is here. */
  view: EditorView | null = null;
  private reading: Reading | null = null;
  private shown: ShownRecords;
  /** A visitor's own values. */
  private settled: Readonly<Record<string, string>> = {};
  private trial: Readonly<Record<string, string>> = {};
  /** A parameter was set: at the next sheet, results that are kept already are to be shown. */
  private wantsKept = false;
  private readonly place: HTMLElement;
  private readonly nonce: string;

  constructor(options: DeskOptions, place: HTMLElement, nonce: string) {
    this.options = options;
    this.place = place;
    this.nonce = nonce;
    this.shown = options.first.shown;
    this.requests = requestsOf(options.paperId);
    this.host = {
      commands: this.commands(),
      plateOf: (id) => `/papers/${options.paperId}/plates/${encodeURIComponent(id)}`,
      writes: options.writes,
      tell: (words, offer) => this.tell(words, offer),
      edit: (change, bibtex) => this.edit(change, bibtex),
      ...hostAtRest(),
    };
    this.fetcher = new ResultFetcher(this.requests, (results) => this.reading?.tellResults(results));
    this.first = this.fetcher.first(this.shown.cells, fetchMathFonts());
    if (options.person !== null) void forgetPrivateCopies(options.person.id);
    this.session = openSession({
      ...options,
      onText: () => this.begin(),
      onConnection: (connection) => this.onConnection(connection),
      onKept: (kept) => this.store.set({ kept }),
      onShown: (shown) => {
        this.shown = shown;
        this.reading?.tellShown(shown);
      },
      onBibliography: () => this.reading?.textChanged(),
      onPeople: (people) => this.store.set({ people }),
      onJoined: (joined) => {
        const words = `Connected. ${joined}`;
        this.store.set({ notice: { words, amiss: false } });
        this.announcer.say(words);
      },
    });
  }

  end(): void {
    this.announcer.end();
    this.fetcher.end();
    this.reading?.end();
    this.view?.destroy();
    this.view = null;
    this.session.end();
  }

  joinAgain(): void {
    this.session.joinAgain();
  }

  openBibliography(parent: HTMLElement): EditorView {
    const { bibliography, undo } = this.session;
    return createSourceEditor({
      parent,
      text: bibliography,
      undo: undo.bibliography,
      nonce: this.nonce,
      writes: this.options.writes,
    });
  }

  /** Shows privately what follows of a value; null puts back. */
  tryParameter(name: string, source: string | null): void {
    this.trial = source === null ? {} : { [name]: source };
    this.reading?.tellPreview(this.settled, this.trial);
  }

  /** Lets a value stand: an author's in the text, as one edit and one undo step; a reader's on this page alone. */
  setParameter(name: string, source: string): void {
    const { view } = this;
    if (view === null) return;
    if (!this.options.writes) {
      this.settled = { ...this.settled, [name]: source };
      this.trial = {};
      this.reading?.tellPreview(this.settled, this.trial);
      return;
    }
    const places = view.state.field(sheetField).places;
    const found = findPlace(places, (piece) => piece.piece === "parameter" && piece.name === name);
    if (found === null) return;
    const changes = { from: found.from, to: found.to, insert: yamlScalar(source) };
    this.editParameters({ changes, userEvent: "input.parameter" });
  }

  /** One edit of parameters: what was tried ends with it, and results that are kept already appear. */
  editParameters(change: TransactionSpec): void {
    this.edit(change);
    this.trial = {};
    this.wantsKept = true;
    // The text first: the trial ends only when what it led to is in the sheet, and nothing older shows in between.
    this.reading?.askNow();
    this.reading?.tellPreview(this.settled, this.trial);
  }

  /** What may be asked of a cell. */
  get cellCommands(): CellCommands {
    return this.host.commands;
  }

  /** One edit of the text, and one step to undo; entries for the bibliography may come with it. */
  edit(change: TransactionSpec, bibtex = ""): void {
    if (bibtex !== "") this.session.bibliography.insert(0, bibtex);
    this.session.undo.text.stopCapturing();
    this.view?.dispatch({ userEvent: "input", ...change });
    this.session.undo.text.stopCapturing();
  }

  /** What formulas are on the sheet that is shown; none before there is one. */
  readonly valuesNow = async (formulas: readonly string[]): Promise<readonly ValueNow[]> =>
    (await this.reading?.values(formulas)) ?? [];

  /** Says something in the tail line for a while, and to those who listen. */
  tell(words: string, offer?: Offer): void {
    const notice = { words, amiss: false, ...(offer === undefined ? {} : { offer }) };
    this.store.set({ notice });
    const rest = TOLD_MS[offer === undefined ? "words" : "offer"];
    setTimeout(() => this.store.get().notice === notice && this.store.set({ notice: null }), rest);
    this.announcer.say(words);
  }

  /** Says something to those who listen to the page. */
  readonly say = (words: string): void => this.announcer.say(words);

  /** A reader goes back to the paper's own values. */
  putBackAll(): void {
    this.settled = {};
    this.trial = {};
    this.reading?.tellPreview(this.settled, this.trial);
  }

  recomputeAll(): void {
    const cells = this.store.get().model?.cells.filter((cell) => cell.sound && TO_RECOMPUTE.has(cell.state)) ?? [];
    void this.recompute(cells.map(({ id }) => id));
  }

  cancelAll(): void {
    void this.ask(this.requests.cancel("all"));
  }

  /** Brings a place of the text into view and leaves the caret where it is. */
  show(position: number): void {
    if (this.view !== null) showPlace(this.view, position);
  }

  /** Brings a plate into view and gives it the keys, once it is drawn. */
  showPlate(position: number): void {
    this.show(position);
    const slot = this.store.get().model?.cells.find(({ from }) => from === position)?.slot;
    if (this.view !== null && slot !== undefined) focusPlate(this.view, slot);
  }

  goTo(position: number): void {
    if (this.view !== null) goToPlace(this.view, position);
  }

  private begin(): void {
    if (this.view !== null) return;
    const { text, undo, awareness } = this.session;
    this.view = createSheetEditor({
      parent: this.place,
      text,
      undo: undo.text,
      awareness,
      host: this.host,
      nonce: this.nonce,
      onUpdate: (update) => this.reading?.onUpdate(update),
    });
    this.store.set({ ready: true });
    void this.first.then((results) => this.view !== null && this.read(this.view, results));
  }

  private read(view: EditorView, results: readonly CellResult[]): void {
    this.reading = new Reading(
      view,
      this.options.takeReader(),
      () => this.bibliographyNow(),
      (model) => this.onModel(model),
      (borders) => this.store.set({ borders }),
    );
    this.reading.tellShown(this.shown);
    if (results.length > 0) this.reading.tellResults(results);
  }

  private onConnection(connection: Connection): void {
    const before = this.store.get().connection.state;
    this.store.set({ connection });
    if (connection.state === before) return;
    if (connection.state === "live" && before === "away") this.fetcher.tryAgain();
    if (connection.state === "away" && before === "live")
      this.announcer.say("No connection. Your words are kept on this machine.");
  }

  private onModel(model: SheetModel): void {
    takeSheet(this.host, model);
    this.host.columnWidth = this.view?.contentDOM.clientWidth || this.host.columnWidth;
    if (this.store.get().model === null && this.view !== null) goToAddress(this.view);
    this.store.set({ model });
    void this.fetcher.want(model.wanted);
    if (!model.preview) this.announcer.hearCells(model.cells);
    if (this.wantsKept && !model.preview) {
      this.wantsKept = false;
      void this.showKept(model);
    }
  }

  /** Results kept under the new keys appear without being asked for; all else waits. */
  private async showKept(model: SheetModel): Promise<void> {
    const waiting = model.cells.filter((cell) => cell.state === "outOfDate" && cell.key !== null);
    if (waiting.length === 0) return;
    const kept = await this.fetcher.kept(waiting.flatMap(({ key }) => key ?? []));
    const ready = waiting.filter(({ key }) => key !== null && kept.has(key));
    if (ready.length > 0) await this.recompute(ready.map(({ id }) => id));
  }

  private commands(): CellCommands {
    return {
      recompute: (cell) => void this.recompute([cell.id]),
      cancel: (cell) => void this.ask(this.requests.cancel([cell.id])),
      letStand: (cell) => void this.ask(this.requests.letStand(cell.id, this.textNow())),
      showWorking: (slot) => this.view !== null && turnWorking(this.view, slot, true, this.options.writes),
      putAway: (slot) => this.view !== null && turnWorking(this.view, slot, false, this.options.writes),
      goToCell: (slot) => {
        const cell = this.store.get().model?.cells.find((each) => each.slot === slot);
        if (cell !== undefined) this.goTo(Math.max(0, cell.from - 1));
      },
      goToLine: (line) => this.view !== null && goToLine(this.view, line),
    };
  }

  private async recompute(ids: readonly string[]): Promise<void> {
    if (ids.length === 0) return;
    await this.ask(this.requests.compute(this.textNow(), this.bibliographyNow(), ids));
  }

  private async ask(request: Promise<{ readonly refused: string } | null>): Promise<void> {
    const answer = await request;
    this.store.set({ notice: answer === null ? null : { words: answer.refused, amiss: true } });
    if (answer !== null) this.announcer.say(answer.refused);
  }

  /** The paper's BibTeX as it is now. */
  bibliographyNow(): string {
    return this.session.bibliography.toString();
  }

  private textNow(): string {
    return this.session.text.toString();
  }
}
