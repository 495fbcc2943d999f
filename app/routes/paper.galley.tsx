import "katex/dist/katex.min.css";
import "../galley/galley.css";
import { requirePaper } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import { renderGalley } from "../galley/index.ts";
import { doubtsOf, setPaper } from "../print/index.ts";
import { CommandLink, RunningHead, TailLine, useLocalTimes } from "../ui/index.ts";
import { ourMarkup } from "../ui/markup.ts";
import type { Route } from "./+types/paper.galley";
import { latexAsAsked, readPrinted } from "./parts/printed.server.ts";
import { SendToPrint } from "./parts/send-to-print.tsx";

export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "read");
  const printed = await readPrinted(context.get(servicesContext), paper.id);
  const { problems } = latexAsAsked(printed, new URL(request.url));
  return {
    id: paper.id,
    title: paper.title,
    authors: printed.paper.front.authors.map((author) => author.name.split(" ").at(-1) ?? author.name).join(", "),
    lines: printed.paper.text.trimEnd().split("\n").length,
    // Set here, so that the page needs neither the typesetting of formulas nor the plates, nor any script.
    galley: renderGalley(printed),
    doubts: doubtsOf(setPaper(printed.paper, printed.plan, printed.results, printed.shown)),
    problems,
  };
}

export default function Galley({ loaderData }: Route.ComponentProps) {
  const { id, title, authors, lines, galley, doubts, problems } = loaderData;
  const sheet = `/papers/${id}`;
  useLocalTimes();
  return (
    <>
      <title>{`Galley of ${title} · Halfline`}</title>
      <RunningHead
        home="/shelf"
        left={<CommandLink to={sheet}>Back to the sheet</CommandLink>}
        title={title}
        right={<span className="head-name">{authors}</span>}
      />
      <main className="galley">
        <div {...ourMarkup(galley)} />
        <SendToPrint sheet={sheet} doubts={doubts} problems={problems} />
      </main>
      <nav className="g-to-print" aria-label="Ways on">
        <a className="button" href="#send-to-print">
          Send to print
        </a>
        <CommandLink to={sheet}>Back to the sheet</CommandLink>
      </nav>
      <TailLine left={`Galleys of lines 1 to ${lines}`} right="Set in Lora" />
    </>
  );
}
