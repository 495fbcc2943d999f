/** A stretch of a text replaced; places are those of the text before all edits made together. */
export interface TextEdit {
  readonly from: number;
  readonly to: number;
  readonly insert: string;
}

/** A text after edits that come in rising order and do not overlap. */
export function edited(text: string, edits: readonly TextEdit[]): string {
  let made = "";
  let at = 0;
  for (const edit of edits) {
    made += text.slice(at, edit.from) + edit.insert;
    at = edit.to;
  }
  return made + text.slice(at);
}
