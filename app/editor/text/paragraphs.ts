import { EditorSelection, type EditorState, type Line, type StateCommand } from "@codemirror/state";
import { blockAbove, breaksCount, continuation, standingOf } from "./source-lines.ts";

/**
 * Whether Enter at `position` begins a new paragraph. On the typeset sheet a single line break is a space, so in
 * prose Enter sets the blank line that parts two paragraphs; within workings, displays, lists, tables, directives,
 * comments and the front matter a line break is a line break.
 */
export function beginsParagraph(state: EditorState, position: number): boolean {
  const line = state.doc.lineAt(position);
  if (line.text.trim() === "" || position === line.from) return false;
  if (/^(\s+|:::|\$\$|\||<!--|\[\^)/.test(line.text)) return false;
  return standingOf(state.doc, line.number) === "prose" && !breaksCount(blockAbove(state.doc, line.number));
}

/** Enter: a new paragraph in prose, the list's or the working's next line elsewhere. */
export const enter: StateCommand = ({ state, dispatch }) => {
  if (state.readOnly) return false;
  const asParagraph = state.selection.ranges.every((range) => beginsParagraph(state, range.from));
  dispatch(
    state.update(asParagraph ? paragraphs(state) : nextLines(state), { scrollIntoView: true, userEvent: "input" }),
  );
  return true;
};

function paragraphs(state: EditorState) {
  const { main } = state.selection;
  const next = state.doc.lineAt(main.to);
  // Before an existing blank line one line break is enough.
  const blankFollows =
    main.to === next.to && next.number < state.doc.lines && state.doc.line(next.number + 1).text === "";
  const insert = blankFollows && state.selection.ranges.length === 1 ? "\n" : "\n\n";
  return state.changeByRange((range) => ({
    changes: { from: range.from, to: range.to, insert },
    range: EditorSelection.cursor(range.from + insert.length),
  }));
}

function nextLines(state: EditorState) {
  return state.changeByRange((range) => {
    const line = state.doc.lineAt(range.from);
    const begins = beginningAfter(state, line);
    // An empty item: its mark goes, and the list has ended.
    if (begins === "" && range.empty && range.from === line.to && line.text.trim() !== "") {
      return { changes: { from: line.from, to: line.to }, range: EditorSelection.cursor(line.from) };
    }
    // Before the mark of an item there is nothing to go on with.
    const insert = `\n${begins === null || range.from - line.from < begins.length ? indentation(state, line, range.from) : begins}`;
    return {
      changes: { from: range.from, to: range.to, insert },
      range: EditorSelection.cursor(range.from + insert.length),
    };
  });
}

/** The mark with which the next line of a list or a quote begins; null elsewhere. */
function beginningAfter(state: EditorState, line: Line): string | null {
  const begins = continuation(line.text);
  return begins !== null && standingOf(state.doc, line.number) === "prose" ? begins : null;
}

/** That of the line, and two more after a key of a working that opens a deeper level. */
function indentation(state: EditorState, line: Line, at: number): string {
  const own = /^[ \t]*/.exec(line.text)?.[0] ?? "";
  if (at < line.from + own.length) return "";
  const opens = at === line.to && /^[ \t]*(- )?[\w.]+:[ \t]*$/.test(line.text);
  const standing = opens ? standingOf(state.doc, line.number) : "prose";
  return standing === "working" || standing === "frontMatter" ? `${own}  ` : own;
}

/** Shift-Enter: a line break and nothing else. */
export const lineBreak: StateCommand = ({ state, dispatch }) => {
  if (state.readOnly) return false;
  dispatch(state.update(state.replaceSelection("\n"), { scrollIntoView: true, userEvent: "input" }));
  return true;
};
