import { CommandLink, RunningHead } from "../../ui/index.ts";

interface Props {
  readonly title: string;
  readonly text: string;
}

/** The paper's words before the live sheet is here: headings and paragraphs, workings left out. */
export function SheetPreface({ title, text }: Props) {
  return (
    <>
      <RunningHead home="/shelf" left={<CommandLink to="/shelf">Shelf</CommandLink>} title={title} />
      <RulePlace text={text} />
      <main className="hl-column hl-preface">
        <PlainText title={title} text={text} />
      </main>
    </>
  );
}

/** Holds the place of the rule until the parameters are read, where the text has any. */
export function RulePlace({ text }: Pick<Props, "text">) {
  return /^(`{3,}|~{3,})[ \t]*parameters\b/m.test(text) ? <div className="hl-rule-place" /> : null;
}

/** The text alone, as it stands in the column until the live sheet covers it. */
export function PlainText({ title, text }: Props) {
  return (
    <>
      <h1 className="hl-title">{title}</h1>
      {plainBlocks(text).map(({ at, words, heading }) =>
        heading ? (
          <h2 key={at} className="hl-heading-2">
            {words}
          </h2>
        ) : (
          <p key={at}>{words}</p>
        ),
      )}
    </>
  );
}

/** Blocks of prose of a paper's text, by where they begin: front matter, fenced blocks, directives and comments left out. */
export function plainBlocks(text: string): { at: number; words: string; heading: boolean }[] {
  const prose = text
    .replace(/^---\n[\s\S]*?\n---(\n|$)/, (found) => " ".repeat(found.length))
    .replace(/^(`{3,}|~{3,})[^\n]*\n[\s\S]*?\n\1[ \t]*$/gm, (found) => blank(found))
    .replace(/<!--[\s\S]*?-->/g, (found) => blank(found))
    .replace(/^:{3,}.*$/gm, (found) => blank(found));
  return [...prose.matchAll(/\S(?:.|\n(?![ \t]*\n))*/g)].flatMap((found) => {
    const heading = /^#{1,6}\s+(.*?)\s*(\{#[^}]*\})?$/.exec(found[0].trim());
    const words = (heading?.[1] ?? found[0]).trim();
    return words === "" ? [] : [{ at: found.index, words, heading: heading !== null }];
  });
}

function blank(found: string): string {
  return found.replace(/[^\n]/g, " ");
}
