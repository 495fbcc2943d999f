import "katex/dist/katex.min.css";
import "../galley/galley.css";
import "./plate.css";
import { CommandLink, RunningHead, TailLine } from "../ui/index.ts";
import { ourMarkup } from "../ui/markup.ts";
import { PlateBeside } from "./beside.tsx";
import type { PlateFace } from "./plate.ts";
import { PlateReader } from "./reader.tsx";

interface Props {
  readonly paperId: string;
  readonly paperTitle: string;
  readonly face: PlateFace;
}

/** Widths a plate is laid out for [px]: text in it keeps its size, so a narrow window gets a plate of its own. */
const WIDE = 940;
const WIDE_HEIGHT = 540;
const NARROW = 358;

/** One figure or table of a paper, large. */
export function PlatePage({ paperId, paperTitle, face }: Props) {
  const { title, line, figure, markup } = face;
  const sheet = `/papers/${paperId}`;
  return (
    <>
      <RunningHead
        home="/shelf"
        left={<CommandLink to={`${sheet}#line-${line}`}>{`Back to line ${line}`}</CommandLink>}
        title={paperTitle}
        right={<CommandLink to={`${sheet}/galley`}>Galley</CommandLink>}
      />
      <main className="plate-page">
        <h1 className="sr-only">{`Plate of ${title}`}</h1>
        <div className="plate-main">
          {figure ? (
            <>
              <div className="plate-wide">
                <PlateReader figure={figure} readings={face.readings} width={WIDE} height={WIDE_HEIGHT} />
              </div>
              <div className="plate-narrow">
                <PlateReader figure={figure} readings={face.readings} width={NARROW} />
              </div>
            </>
          ) : null}
          <div className="plate-caption" {...ourMarkup(markup.caption)} />
          {markup.table === "" ? null : <Rows title="Table" open={!figure} html={markup.table} />}
          {markup.points === "" ? null : <Rows title="Points of the figure" open={false} html={markup.points} />}
        </div>
        <PlateBeside sheet={sheet} files={`${sheet}/plates/${encodeURIComponent(face.cell)}`} face={face} />
      </main>
      <TailLine left={`Plate of ${title}`} right={`Working in line ${line}`} />
    </>
  );
}

function Rows({ title, open, html }: { readonly title: string; readonly open: boolean; readonly html: string }) {
  return (
    <details className="plate-rows" open={open}>
      <summary>{title}</summary>
      <div {...ourMarkup(html)} />
    </details>
  );
}
