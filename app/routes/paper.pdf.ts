import { requirePaper } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import type { Route } from "./+types/paper.pdf";
import { fileName, latexAsAsked, readPrinted, refusePrint } from "./parts/printed.server.ts";

/** The paper as PDF, or what keeps it from print. */
export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "read");
  const services = context.get(servicesContext);
  const latex = latexAsAsked(await readPrinted(services, paper.id), new URL(request.url));
  if (latex.problems.length > 0) return refusePrint(request, paper.id, latex.problems);
  const made = await services.pdf.typeset(latex);
  if (!made.ok) return refusePrint(request, paper.id, made.problems);
  return new Response(made.pdf.slice().buffer, {
    headers: {
      "Content-Type": "application/pdf",
      "Content-Disposition": `inline; filename="${fileName(paper.title, "pdf")}"`,
      "Cache-Control": "private, no-store",
    },
  });
}
