import "katex/dist/katex.min.css";
import "../galley/galley.css";
import "./plate.css";
import { requirePaper } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import { FigurePlate } from "../figures/index.ts";
import { CommandLink, RunningHead, TailLine } from "../ui/index.ts";
import { ourMarkup } from "../ui/markup.ts";
import { renderMath } from "../ui/math.ts";
import type { Route } from "./+types/paper.plate";
import { findPlate, plateValues, quotationsOf } from "./parts/plate.server.ts";
import { PlateBeside } from "./parts/plate-beside.tsx";
import { readPrinted } from "./parts/printed.server.ts";

export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "read");
  const printed = await readPrinted(context.get(servicesContext), paper.id);
  const plate = findPlate(printed, params.cell);
  const { planned, view, markup, title, parameters } = plate;
  const declared = printed.plan.parameters.filter(({ name }) => Object.hasOwn(parameters, name));
  return {
    id: paper.id,
    cell: planned.id,
    line: planned.line,
    paperTitle: paper.title,
    title,
    figure: view.figure,
    markup,
    values: plateValues(plate),
    quotations: quotationsOf(plate, printed),
    parameters: declared.map(({ name, symbol, note }) => ({
      name,
      note,
      // Set here, so that the page does not need the typesetting of formulas.
      html: renderMath(`${symbol} = ${parameters[name] ?? ""}`, false, printed.paper.front.macros),
    })),
  };
}

export default function PlatePage({ loaderData }: Route.ComponentProps) {
  const { id, cell, line, paperTitle, title, figure, markup, ...beside } = loaderData;
  const sheet = `/papers/${id}`;
  const files = `${sheet}/plates/${encodeURIComponent(cell)}`;
  return (
    <>
      <title>{`${title} of ${paperTitle} · Halfline`}</title>
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
                <FigurePlate figure={figure} width={940} />
              </div>
              <div className="plate-narrow">
                <FigurePlate figure={figure} width={358} />
              </div>
            </>
          ) : null}
          <div className="g-paper plate-caption" {...ourMarkup(markup.caption)} />
          {markup.table === "" ? null : <Rows title="Table" open={!figure} html={markup.table} />}
          {markup.points === "" ? null : <Rows title="Points of the figure" open={false} html={markup.points} />}
        </div>
        <PlateBeside sheet={sheet} files={files} figure={figure !== null} table={markup.table !== ""} {...beside} />
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
