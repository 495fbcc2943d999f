import "katex/dist/katex.min.css";
import "../figures/figure-reading.css";
import "../galley/galley.css";
import "./plate.css";
import { type CurveReadings, type Figure, FigurePlate, FigureReading } from "../figures/index.ts";
import { CommandLink, RunningHead, TailLine, useLocalTimes } from "../ui/index.ts";
import { ourMarkup } from "../ui/markup.ts";
import { PlateBeside } from "./beside.tsx";
import type { PlateFace } from "./plate.ts";

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
  useLocalTimes();
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
                <ReadPlate figure={figure} readings={face.readings} width={WIDE} height={WIDE_HEIGHT} />
              </div>
              <div className="plate-narrow">
                <ReadPlate figure={figure} readings={face.readings} width={NARROW} />
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

interface ReadPlateProps {
  readonly figure: Figure;
  readonly readings: readonly CurveReadings[];
  /** [px] */
  readonly width: number;
  readonly height?: number;
}

function ReadPlate({ figure, readings, width, height }: ReadPlateProps) {
  return (
    <div className="figure-read" style={{ maxWidth: width }}>
      <FigurePlate figure={figure} width={width} height={height} />
      <FigureReading figure={figure} readings={readings} width={width} height={height} curvesByTab />
    </div>
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
