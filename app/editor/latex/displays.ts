/** Displays whose rows stand beneath each other, by what a paper writes for them. */
const ROWS: Readonly<Record<string, string>> = { align: "aligned", gather: "gathered" };

const LABEL = /\\label\s*\{([^{}]*)\}/g;
/** What labels a paper knows. */
export const LABEL_FORM = /^[A-Za-z0-9][\w:.-]*$/;

/**
 * A display of LaTeX as one of a paper; null where that is not sure: rows that are numbered one by one, words between
 * rows, and what is neither `equation` nor `align` nor `gather`.
 * @param name of the surroundings, "" for a display in brackets or dollars
 * @param tex between its begin and end
 */
export function displayOf(name: string, tex: string): string | null {
  const kind = name.replace(/\*$/, "");
  const rows = ROWS[kind];
  if (kind !== "" && kind !== "equation" && rows === undefined) return null;
  const labels = [...tex.matchAll(LABEL)].map(([, label = ""]) => label);
  if (labels.length > 1 || labels.some((label) => !LABEL_FORM.test(label)) || /\\intertext\s*\{/.test(tex)) return null;
  // A paper numbers what has a label, so that there is nothing to take a number from.
  const bare = tex
    .replace(LABEL, "")
    .replace(/\\(?:nonumber|notag)(?![A-Za-z])/g, "")
    .replace(/\n[ \t]*(?=\n)/g, "")
    .trim();
  const body = rows === undefined ? bare : `\\begin{${rows}}\n${bare}\n\\end{${rows}}`;
  const label = labels[0] === undefined ? "" : `\n\\label{${labels[0]}}`;
  return `$$\n${body}${label}\n$$`;
}
