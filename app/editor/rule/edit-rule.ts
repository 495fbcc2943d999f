import { changesParameter, movesParameter, type ParameterEdit, type ParameterProblem } from "../../cells/index.ts";
import { type Paper, readPaper } from "../../paper/index.ts";
import type { SheetAtHand } from "../keys/types.ts";
import { focusHandle } from "./handles.ts";

type Reading = Pick<SheetAtHand, "desk" | "view">;

/** The paper as it is on the sheet, with its bibliography. */
export function paperNow({ desk, view }: Reading): { readonly paper: Paper; readonly bibliography: string } {
  const bibliography = desk.bibliographyNow();
  return { paper: readPaper(view.state.doc.toString(), bibliography), bibliography };
}

/** Why a parameter cannot have a value; "" when it can. */
export function valueFault(sheet: Reading, name: string, source: string): string {
  const { paper, bibliography } = paperNow(sheet);
  const edit = changesParameter(paper, bibliography, name, { value: source });
  return "problem" in edit ? plainWords(edit.problem) : "";
}

/** A problem's words without the marks that set names apart in the text's own glosses. */
export function plainWords(problem: string): string {
  return problem.replace(/`([^`]*)`/g, "$1");
}

/** Lets a parameter stand one place earlier or later: one edit of the text. What is said of it follows by itself. */
export function moveOnRule(sheet: Reading, name: string, by: -1 | 1): void {
  const { paper, bibliography } = paperNow(sheet);
  const edit = movesParameter(paper, bibliography, name, by);
  if (!made(sheet, edit)) {
    sheet.desk.tell(plainWords(edit.problem));
    return;
  }
  const held = document.activeElement;
  if (held instanceof HTMLElement && held.dataset.parameter === name) focusHandle(name);
  sheet.desk.tell(`${name} stands ${by < 0 ? "earlier" : "later"}; one step to undo.`);
}

/** Makes an edit of the parameters, unless it is a problem. @returns whether it was made */
export function made({ desk }: Reading, edit: ParameterEdit | ParameterProblem): edit is ParameterEdit {
  if ("problem" in edit) return false;
  if (edit.edits.length > 0) desk.editParameters({ changes: edit.edits, userEvent: "input.parameter" });
  return true;
}
