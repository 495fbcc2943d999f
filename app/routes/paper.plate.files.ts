import { refusal, requirePaper } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import { FILE_NAMES, findPlate, takeAway } from "../plate/index.server.ts";
import type { Route } from "./+types/paper.plate.files";
import { fileName, readPrinted, refusePrint } from "./parts/printed.server.ts";

/** A figure, its points, a table or a whole result as a file. */
export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "read");
  if (!FILE_NAMES.includes(params.file)) throw refusal(404, `A plate is taken away as ${FILE_NAMES.join(", ")}.`);
  const services = context.get(servicesContext);
  const printed = await readPrinted(services, paper.id);
  const plate = findPlate(printed, params.cell);
  if ("absent" in plate) throw refusal(404, plate.absent);
  const taken = takeAway(params.file, plate, printed);
  const [part = "", extension = ""] = params.file.split(".");
  if (taken === null) throw refusal(404, `${plate.title} has no ${part === "plate" ? "figure" : part}.`);
  const name = fileName(`${plate.planned.id} ${part}`, extension);
  if ("text" in taken) return asFile(taken.text, taken.type, name);
  if (taken.latex.problems.length > 0) return refusePrint(request, paper.id, taken.latex.problems);
  const made = await services.pdf.typeset(taken.latex);
  return made.ok
    ? asFile(made.pdf.slice().buffer, "application/pdf", name)
    : refusePrint(request, paper.id, made.problems);
}

function asFile(body: string | ArrayBuffer, type: string, name: string): Response {
  return new Response(body, {
    headers: {
      "Content-Type": type,
      "Content-Disposition": `attachment; filename="${name}"`,
      "Cache-Control": "private, no-store",
    },
  });
}
