import type { RootContent } from "mdast";
import type { CellResult, Plan, ShownPaper } from "../cells/index.ts";
import { layoutFigure } from "../figures/index.ts";
import {
  type BibliographyEntry,
  bibliographyItem,
  type FrontMatter,
  type Paper,
  readInline,
  UNTITLED,
} from "../paper/index.ts";
import { setPaper } from "../print/index.ts";
import { ProseBlocks } from "./blocks.tsx";
import { Formula, Inline, Words } from "./inline.tsx";
import { anchor, type Foot, footOf, makeSetting, type Setting } from "./setting.ts";
import { captionHeight, partIntoStrips, type Strip } from "./strips.ts";

export interface GalleyPaperProps {
  readonly paper: Paper;
  readonly plan: Plan;
  /** By id of the cell: what the paper shows. */
  readonly results: ReadonlyMap<string, CellResult>;
  readonly shown: ShownPaper;
}

/** A paper typeset for reading, in galleys: strips that stand two by two in a wide window. Needs no script. */
export function GalleyPaper({ paper, plan, results, shown }: GalleyPaperProps) {
  const setting = makeSetting(setPaper(paper, plan, results, shown));
  const strips = partIntoStrips(paper.root.children, (node) => cellHeight(node, setting), frontHeight(paper.front));
  const seen = new Set<string>();
  const cited = paper.bibliography
    .filter((entry) => entry.number !== null)
    .sort((a, b) => (a.number ?? 0) - (b.number ?? 0));
  return (
    <div className="g-paper" lang="en">
      {strips.map((strip, i) => (
        <section key={strip.firstLine} className="g-strip" id={`galley-${i + 1}`} aria-label={`Galley ${i + 1}`}>
          <StripHead strip={strip} at={i + 1} of={strips.length} />
          {i === 0 ? <Front front={paper.front} setting={setting} /> : null}
          <ProseBlocks nodes={strip.nodes} setting={setting} />
          {i === strips.length - 1 && cited.length > 0 ? <Bibliography entries={cited} setting={setting} /> : null}
          <StripFoot foot={footOf(strip.nodes, setting, seen)} setting={setting} />
        </section>
      ))}
    </div>
  );
}

/** Lines of an abstract hold fewer words, since it is set narrower. */
function frontHeight(front: FrontMatter): number {
  const abstract = Math.ceil(front.abstract.length / 60) * 21;
  return (
    80 + 46 * front.authors.length + abstract + (front.keywords.length > 0 ? 40 : 0) + (front.msc.length > 0 ? 20 : 0)
  );
}

function cellHeight(node: RootContent, setting: Setting): number {
  if (node.type !== "cell") return 0;
  const { view } = setting.set.cell(node.cell);
  return node.parts.reduce((height, part) => {
    if (part.part === "figure")
      return (
        height +
        32 +
        captionHeight(node.caption) +
        (view?.figure ? layoutFigure(view.figure, { width: 500 }).height : 40)
      );
    const table = part.part === "points" ? view?.points : view?.table;
    return height + 80 + captionHeight(node.caption) + 24 * (table?.rows.length ?? 1);
  }, 0);
}

function StripHead({ strip, at, of }: { readonly strip: Strip; readonly at: number; readonly of: number }) {
  return (
    <header className="g-strip-head">
      <span>
        {of === 1 ? "Galley" : `Galley ${at}`}
        <span className="g-of">{` of ${of}`}</span>
      </span>
      <span className="g-strip-lines">{`lines ${strip.firstLine} to ${strip.lastLine}`}</span>
      <nav className="g-strip-places" aria-label={`Beside galley ${at}`}>
        {at > 1 ? <a href={`#galley-${at - 1}`}>Earlier</a> : null}
        {at < of ? <a href={`#galley-${at + 1}`}>Later</a> : null}
      </nav>
    </header>
  );
}

function Front({ front, setting }: { readonly front: FrontMatter; readonly setting: Setting }) {
  const inline = (text: string) => <Inline nodes={readInline(text, 0, setting.set.paper)} setting={setting} />;
  return (
    <div className="g-front">
      <h1>{front.title.trim() === "" ? UNTITLED : inline(front.title)}</h1>
      {front.authors.length > 0 ? (
        <ul className="g-authors">
          {front.authors.map((author) => (
            <li key={author.name}>
              {author.name}
              {author.affiliation ? <span className="g-affiliation">{author.affiliation}</span> : null}
            </li>
          ))}
        </ul>
      ) : null}
      {front.abstract.trim() === "" ? null : (
        <p className="g-abstract">
          <b>Abstract.</b> {inline(front.abstract)}
        </p>
      )}
      {front.keywords.length > 0 ? (
        <p className="g-keywords">
          <i>Keywords:</i> {inline(front.keywords.join(", "))}
        </p>
      ) : null}
      {front.msc.length > 0 ? (
        <p className="g-keywords">
          <i>Mathematics Subject Classification (2020):</i> {front.msc.join(", ")}
        </p>
      ) : null}
    </div>
  );
}

function Bibliography({
  entries,
  setting,
}: {
  readonly entries: readonly BibliographyEntry[];
  readonly setting: Setting;
}) {
  return (
    <>
      <h2>Bibliography</h2>
      <ol className="g-works">
        {entries.map((entry) => (
          <li key={entry.key} id={anchor.work(entry.key)}>
            <span className="g-work-number">{`[${entry.number}]`}</span>
            <span>
              {bibliographyItem(entry).map((run, i) => {
                const key = `${i} ${run.text}`;
                if (run.math) return <Formula key={key} tex={run.text} setting={setting} />;
                if (run.link !== undefined)
                  return (
                    <a key={key} href={run.link} rel="noreferrer">
                      {run.text}
                    </a>
                  );
                return run.emphasis ? <em key={key}>{run.text}</em> : <span key={key}>{run.text}</span>;
              })}
            </span>
          </li>
        ))}
      </ol>
    </>
  );
}

function StripFoot({ foot, setting }: { readonly foot: Foot; readonly setting: Setting }) {
  if (foot.notes.length === 0 && foot.footnotes.length === 0) return null;
  return (
    <footer className="g-foot">
      {foot.notes.map((note) => (
        <p key={note.mark} id={anchor.note(note.mark)}>
          <span className="g-dagger">{note.mark}</span> <Words words={note.words} setting={setting} />
        </p>
      ))}
      {foot.footnotes.map(({ number, definition }) => (
        <div key={number} id={anchor.footnote(number)} className="g-footnote">
          <sup>{number}</sup>
          <div>
            <ProseBlocks nodes={definition.children} setting={setting} />
          </div>
        </div>
      ))}
    </footer>
  );
}
