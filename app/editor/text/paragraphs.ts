import { insertNewlineAndIndent } from "@codemirror/commands";
import { insertNewlineContinueMarkup } from "@codemirror/lang-markdown";
import { syntaxTree } from "@codemirror/language";
import { EditorSelection, type EditorState, type StateCommand } from "@codemirror/state";

/**
 * Whether Enter at `position` begins a new paragraph. On the typeset sheet a single line break is a space, so in
 * prose Enter sets the blank line that parts two paragraphs; within workings, displays, lists, tables, directives,
 * comments and the front matter a line break is a line break.
 */
export function beginsParagraph(state: EditorState, position: number): boolean {
  const line = state.doc.lineAt(position);
  if (line.text.trim() === "" || position === line.from) return false;
  if (/^\s*(:::|\$\$|\||>|<!--|```|~~~|[-*+]\s|\d+[.)]\s|\[\^)/.test(line.text)) return false;
  for (let node = syntaxTree(state).resolveInner(position, -1); ; ) {
    if (OPAQUE.has(node.name)) return false;
    if (node.parent === null) break;
    node = node.parent;
  }
  return !withinDisplay(state, line.number);
}

/** Names of lang-markdown's and lang-yaml's trees whose line breaks count. */
const OPAQUE = new Set([
  "FencedCode",
  "CodeBlock",
  "HTMLBlock",
  "CommentBlock",
  "Table",
  "BulletList",
  "OrderedList",
  "Blockquote",
  "Frontmatter",
  "DashLine",
  "FrontmatterContent",
]);

/** An odd number of lines that open or close a display stand above, back to the last blank line. */
function withinDisplay(state: EditorState, lineNumber: number): boolean {
  let inside = false;
  for (let number = lineNumber; number >= 1; number -= 1) {
    const text = state.doc.line(number).text;
    if (text.trim() === "") break;
    const fences = text.match(/\$\$/g)?.length ?? 0;
    if (fences % 2 === 1) inside = !inside;
  }
  return inside;
}

/** Enter: a new paragraph in prose, the list's or the working's next line elsewhere. */
export const enter: StateCommand = (target) => {
  const { state, dispatch } = target;
  const { main } = state.selection;
  if (state.readOnly) return false;
  if (!state.selection.ranges.every((range) => beginsParagraph(state, range.from))) {
    return insertNewlineContinueMarkup(target) || insertNewlineAndIndent(target);
  }
  const next = state.doc.lineAt(main.to);
  // Before an existing blank line one line break is enough.
  const blankFollows =
    main.to === next.to && next.number < state.doc.lines && state.doc.line(next.number + 1).text === "";
  const insert = blankFollows && state.selection.ranges.length === 1 ? "\n" : "\n\n";
  dispatch(
    state.update(
      state.changeByRange((range) => ({
        changes: { from: range.from, to: range.to, insert },
        range: EditorSelection.cursor(range.from + insert.length),
      })),
      { scrollIntoView: true, userEvent: "input" },
    ),
  );
  return true;
};

/** Shift-Enter: a line break and nothing else. */
export const lineBreak: StateCommand = ({ state, dispatch }) => {
  if (state.readOnly) return false;
  dispatch(state.update(state.replaceSelection("\n"), { scrollIntoView: true, userEvent: "input" }));
  return true;
};
