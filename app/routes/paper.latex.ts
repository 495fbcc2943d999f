import { downloadZip } from "client-zip";
import { requirePaper } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import type { Route } from "./+types/paper.latex";
import { fileName, latexAsAsked, readPrinted, refusePrint } from "./parts/printed.server.ts";

/** The LaTeX source with the points of its figures, or what keeps the paper from print. */
export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "read");
  const latex = latexAsAsked(await readPrinted(context.get(servicesContext), paper.id), new URL(request.url));
  if (latex.problems.length > 0) return refusePrint(request, paper.id, latex.problems);
  const zip = downloadZip(latex.files.map(({ name, text }) => ({ name, input: text })));
  return new Response(zip.body, {
    headers: {
      "Content-Type": "application/zip",
      "Content-Disposition": `attachment; filename="${fileName(paper.title, "zip")}"`,
      "Cache-Control": "private, no-store",
    },
  });
}
