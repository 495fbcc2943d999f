import type { ReactNode } from "react";
import type { Doubts } from "../../print/index.ts";
import { Button, CommandLink } from "../../ui/index.ts";

interface Props {
  /** Where the sheet is: the ways to print lie under it. */
  readonly sheet: string;
  readonly doubts: Doubts;
  readonly problems: readonly { readonly line: number; readonly message: string }[];
}

/** What can be taken away from the galley. A plain form: it needs no script. */
export function SendToPrint({ sheet, doubts, problems }: Props) {
  return (
    <aside className="g-print" id="send-to-print">
      <h2>Send to print</h2>
      <form method="get" action={`${sheet}/paper.pdf`}>
        <Choice name="lines">Number every fifth line</Choice>
        <Choice name="provenance" chosen>
          Say under each figure how it was set
        </Choice>
        <Choice name="anonymous">Leave out names, for referees</Choice>
        <hr />
        {doubts.outOfDate > 0 ? (
          <p className="g-doubt">
            <span className="g-dagger">†</span> {outOfDateWords(doubts.outOfDate)}{" "}
            <CommandLink to={sheet}>Recompute first</CommandLink>
          </p>
        ) : null}
        {problems.length > 0 ? <Problems problems={problems} sheet={sheet} /> : null}
        {problems.length > 0 ? null : (
          <>
            <Button>Make the PDF</Button>
            <Button outlined formAction={`${sheet}/latex.zip`}>
              Take the LaTeX source
            </Button>
            <p className="g-afterword">A4, one column. The source holds text, plates, points and bibliography.</p>
          </>
        )}
      </form>
    </aside>
  );
}

function Choice({
  name,
  chosen = false,
  children,
}: {
  readonly name: string;
  readonly chosen?: boolean;
  readonly children: string;
}) {
  return (
    <label className="g-choice">
      <input type="checkbox" name={name} defaultChecked={chosen} />
      <span>{children}</span>
    </label>
  );
}

function outOfDateWords(count: number): string {
  if (count === 1) return "One number or plate is out of date. It will print with a dagger and a footnote.";
  return `${count} numbers and plates are out of date. They will print with daggers and footnotes.`;
}

function Problems({ problems, sheet }: Pick<Props, "problems" | "sheet">) {
  return (
    <div className="g-doubt">
      <p>
        <span className="g-dagger">‡</span>{" "}
        {problems.length === 1 ? "One thing keeps" : `${problems.length} things keep`} this paper from print. Mend or
        remove {problems.length === 1 ? "it" : "them"} first.
      </p>
      <ul>
        {problems.map(({ line, message }) => (
          <li key={`${line} ${message}`}>
            {line > 0 ? `Line ${line}: ` : "Bibliography: "}
            <WordsWithCode words={message} />
          </li>
        ))}
      </ul>
      <CommandLink to={sheet}>Back to the sheet</CommandLink>
    </div>
  );
}

/** Words of ours in which names of the paper stand between backticks. */
function WordsWithCode({ words }: { readonly words: string }): ReactNode {
  const [before = "", code, ...after] = words.split("`");
  if (code === undefined) return before;
  return (
    <>
      {before}
      <code>{code}</code>
      <WordsWithCode words={after.join("`")} />
    </>
  );
}
