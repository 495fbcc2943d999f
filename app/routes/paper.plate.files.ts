import { refusal, requirePaper } from "../access/index.server.ts";
import { cellRecord } from "../cells/index.ts";
import { type Services, servicesContext } from "../context.ts";
import { plateToLatex } from "../export/index.ts";
import { figureToCsv, tableToCsv } from "../figures/index.ts";
import { setPaper } from "../print/index.ts";
import type { Route } from "./+types/paper.plate.files";
import { findPlate, type Plate } from "./parts/plate.server.ts";
import { fileName, type PrintedPaper, readPrinted, refusePrint } from "./parts/printed.server.ts";

interface Taking {
  readonly request: Request;
  readonly services: Services;
  readonly printed: PrintedPaper;
  readonly plate: Plate;
  readonly paperId: string;
}

/** What a file of a plate holds; null where the cell has no such part, a Response where it cannot be made. */
type Taken = string | Uint8Array | Response | null;

const CSV = "text/csv; charset=utf-8";

/** What may be taken away of a plate, by the last word of its address. */
const FILES: ReadonlyMap<string, { readonly type: string; take(taking: Taking): Taken | Promise<Taken> }> = new Map([
  ["points.csv", { type: CSV, take: ({ plate: { view } }) => (view.figure ? figureToCsv(view.figure) : null) }],
  ["table.csv", { type: CSV, take: ({ plate: { view } }) => (view.table ? tableToCsv(view.table) : null) }],
  ["result.json", { type: "application/json", take: takeRecord }],
  ["plate.pdf", { type: "application/pdf", take: takePdf }],
]);

/** A figure, its points, a table or a whole result as a file. */
export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "read");
  const file = FILES.get(params.file);
  if (!file) throw refusal(404, `A plate is taken away as ${[...FILES.keys()].join(", ")}.`);
  const services = context.get(servicesContext);
  const printed = await readPrinted(services, paper.id);
  const plate = findPlate(printed, params.cell);
  const [part = "", extension = ""] = params.file.split(".");
  const taken = await file.take({ request, services, printed, plate, paperId: paper.id });
  if (taken === null) throw refusal(404, `${plate.title} has no ${part === "plate" ? "figure" : part}.`);
  if (taken instanceof Response) return taken;
  return new Response(typeof taken === "string" ? taken : taken.slice().buffer, {
    headers: {
      "Content-Type": file.type,
      "Content-Disposition": `attachment; filename="${fileName(`${plate.planned.id} ${part}`, extension)}"`,
      "Cache-Control": "private, no-store",
    },
  });
}

function takeRecord({ plate: { planned, result, view, parameters } }: Taking): Taken {
  return `${JSON.stringify(cellRecord(planned, result, view, parameters), null, 2)}\n`;
}

async function takePdf({ request, services, printed, plate, paperId }: Taking): Promise<Taken> {
  const { paper, plan, results, shown } = printed;
  if (!plate.view.figure) return null;
  const set = setPaper(paper, plan, results, shown);
  const latex = plateToLatex(plate.view.figure, paper, set, plate.planned.line, 120);
  if (latex.problems.length > 0) return refusePrint(request, paperId, latex.problems);
  const made = await services.pdf.typeset(latex);
  return made.ok ? made.pdf : refusePrint(request, paperId, made.problems);
}
