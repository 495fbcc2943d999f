import { type EditorState, StateEffect, StateField } from "@codemirror/state";
import { Decoration, type DecorationSet, EditorView, WidgetType } from "@codemirror/view";
import type { ProblemFace } from "../model/types.ts";
import { element } from "./element.ts";
import { findPlace } from "./places.ts";
import { sheetField } from "./sheet-field.ts";

/** Faults of the text to be shown; positions are those of the text at hand. */
export const setProblems = StateEffect.define<readonly ProblemFace[]>();

interface Glosses {
  readonly problems: readonly ProblemFace[];
  readonly shown: DecorationSet;
  /** Proof mark by line number. */
  readonly marks: ReadonlyMap<number, string>;
}

/**
 * What is wrong is said in a gloss between rules under its line, with a proof mark in the margin. The fault of a cell
 * whose working is put away is said at its plate instead.
 */
export const glossField = StateField.define<Glosses>({
  create: () => ({ problems: [], shown: Decoration.none, marks: new Map() }),
  update(before, transaction) {
    let { problems } = before;
    if (transaction.docChanged) {
      const { changes, newDoc } = transaction;
      problems = problems.map((problem) => {
        const from = changes.mapPos(problem.from, 1);
        return {
          ...problem,
          from,
          to: Math.max(from, changes.mapPos(problem.to, -1)),
          line: newDoc.lineAt(from).number,
        };
      });
    }
    for (const effect of transaction.effects) {
      if (effect.is(setProblems)) problems = effect.value.filter((problem) => problem.to <= transaction.newDoc.length);
    }
    const openings = transaction.startState.field(sheetField).opened !== transaction.state.field(sheetField).opened;
    if (problems === before.problems && !openings) return before;
    return { problems, ...drawn(problems, transaction.state) };
  },
  provide: (field) => EditorView.decorations.from(field, (glosses) => glosses.shown),
});

function drawn(problems: readonly ProblemFace[], state: EditorState): Pick<Glosses, "shown" | "marks"> {
  const opened = state.field(sheetField).opened;
  const openSlots = new Set([...opened].flatMap((piece) => (piece.piece === "cell" ? [piece.slot] : [])));
  const marks = new Map<number, string>();
  const ranges = problems.flatMap((problem) => {
    if (problem.slot !== null && !openSlots.has(problem.slot)) return [];
    const line = state.doc.lineAt(problem.from);
    marks.set(line.number, problem.severity === "error" ? "‡" : "†");
    // Under its line, or under the block that is typeset in its place.
    const under = closedBlockAround(state, problem.from) ?? line.to;
    const number = line.number - (problem.slot === null ? 0 : linesAbove(state, problem.slot));
    const gloss = Decoration.widget({ widget: new Gloss(problem, number), block: true, side: 2 }).range(under);
    const fault =
      problem.to > problem.from && problem.to <= state.doc.lineAt(problem.from).to
        ? [Decoration.mark({ class: "hl-fault" }).range(problem.from, problem.to)]
        : [];
    return [...fault, gloss];
  });
  return { shown: Decoration.set(ranges, true), marks };
}

/** How many lines stand above a working: its own are counted from its first. */
function linesAbove(state: EditorState, slot: string): number {
  const place = findPlace(state.field(sheetField).places, (piece) => piece.piece === "cell" && piece.slot === slot);
  return place === null ? 0 : state.doc.lineAt(place.from).number - 1;
}

/** Where the block ends that is typeset over a position at the moment, or null. */
function closedBlockAround(state: EditorState, at: number): number | null {
  const { places, opened } = state.field(sheetField);
  let end: number | null = null;
  places.between(at, at, (_from, to, { piece }) => {
    if (piece.piece === "set" && piece.block && !opened.has(piece)) end = state.doc.lineAt(to).to;
  });
  return end;
}

class Gloss extends WidgetType {
  private readonly problem: ProblemFace;
  private readonly line: number;
  constructor(problem: ProblemFace, line: number) {
    super();
    this.problem = problem;
    this.line = line;
  }
  override eq(other: Gloss): boolean {
    return (
      this.line === other.line &&
      this.problem.message === other.problem.message &&
      JSON.stringify(this.problem.fix) === JSON.stringify(other.problem.fix)
    );
  }
  override get estimatedHeight(): number {
    return 44;
  }
  override toDOM(view: EditorView): HTMLElement {
    const { message, severity, fix } = this.problem;
    const words = /^line \d/i.test(message) ? message : `Line ${this.line}: ${message}`;
    const made = element("div", severity === "error" ? "hl-gloss hl-gloss-error" : "hl-gloss", [
      element("b", "", [severity === "error" ? "‡ " : "† "], { "aria-hidden": "true" }),
      words,
    ]);
    if (fix !== null && !view.state.readOnly) {
      const command = element("button", "command hl-small", [fix.label], { type: "button" });
      command.addEventListener("mousedown", (event) => event.preventDefault());
      command.addEventListener("click", () => this.mend(view));
      made.append(" ", command);
    }
    return made;
  }
  override ignoreEvent(): boolean {
    return true;
  }
  /** The offered change is about the text when it was read; the problem's present place says how far it has moved. */
  private mend(view: EditorView): void {
    const { fix } = this.problem;
    const now = view.state.field(glossField).problems.find((each) => each.message === this.problem.message);
    if (fix === null || now?.fix === undefined || now.fix === null) return;
    const moved = now.from - this.problem.from;
    view.dispatch({ changes: { from: fix.from + moved, to: fix.to + moved, insert: fix.insert }, userEvent: "input" });
  }
}
