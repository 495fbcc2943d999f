import type { CellResult, Plan, ShownPaper } from "../../cells/index.ts";
import { planPaper } from "../../cells/index.ts";
import type { Services } from "../../context.ts";
import type { LatexPaper } from "../../export/index.ts";
import { paperToLatex } from "../../export/index.ts";
import { type Paper, readPaper } from "../../paper/index.ts";

/** A paper with what it shows, ready to be set. */
export interface PrintedPaper {
  readonly paper: Paper;
  readonly plan: Plan;
  readonly results: ReadonlyMap<string, CellResult>;
  readonly shown: ShownPaper;
  readonly bibliography: string;
}

/** Reads the committed text of a paper, plans it, and fetches the results that it shows. */
export async function readPrinted({ texts, compute }: Services, paperId: string): Promise<PrintedPaper> {
  const [{ text, bibliography }, records] = await Promise.all([texts.read(paperId), texts.shown(paperId)]);
  const paper = readPaper(text, bibliography);
  const plan = planPaper(paper);
  const shown: ShownPaper = {
    cells: new Map(Object.entries(records.cells)),
    work: new Map(Object.entries(records.work)),
    changes: new Map(Object.entries(records.changes)),
  };
  const keys = plan.cells.map((cell) => shown.cells.get(cell.slot)?.key ?? "");
  const kept = await compute.results(paperId, [...new Set(keys.filter((key) => key !== ""))]);
  const results = new Map(
    plan.cells.flatMap((cell, i) => {
      const result = kept[keys[i] ?? ""];
      return result ? [[cell.id, result] as const] : [];
    }),
  );
  return { paper, plan, results, shown, bibliography };
}

/** The LaTeX source as the form beside the galley asks for it. */
export function latexAsAsked(printed: PrintedPaper, url: URL): LatexPaper {
  const asked = (name: string) => url.searchParams.has(name);
  return paperToLatex(printed.paper, printed.plan, printed.results, printed.shown, {
    bibliography: printed.bibliography,
    provenance: asked("provenance"),
    lineNumbers: asked("lines"),
    anonymous: asked("anonymous"),
  });
}

export interface PrintFault {
  readonly line: number | null;
  readonly message: string;
}

/** 422 with what keeps the paper from print: as a page for a person, as JSON for a program. */
export function refusePrint(request: Request, paperId: string, problems: readonly PrintFault[]): Response {
  if (!request.headers.get("Accept")?.includes("text/html")) return Response.json({ problems }, { status: 422 });
  const items = problems
    .map(({ line, message }) => `<li>${line ? `Line ${line}: ` : ""}${escapeHtml(message)}</li>`)
    .join("");
  const page = `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>Not printed · Halfline</title></head>
<body><main><h1>This paper cannot be printed yet</h1><ul>${items}</ul><p><a href="/papers/${paperId}/galley">Back to the galley</a> · <a href="/papers/${paperId}">Back to the sheet</a></p></main></body></html>`;
  return new Response(page, { status: 422, headers: { "Content-Type": "text/html; charset=utf-8" } });
}

/** A name for what is taken away, from the paper's title: ASCII letters, digits and hyphens. */
export function fileName(title: string, extension: string): string {
  const words =
    title
      .normalize("NFKD")
      .replace(/[\u0300-\u036f]/g, "")
      .toLowerCase()
      .match(/[a-z0-9]+/g) ?? [];
  return `${words.join("-").slice(0, 60).replace(/-$/, "") || "paper"}.${extension}`;
}

function escapeHtml(text: string): string {
  return text.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll(">", "&gt;").replaceAll('"', "&quot;");
}
