import { z } from "zod";
import { refusal, requirePaper, requirePerson } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import type { Route } from "./+types/paper.compute";
import { readBody } from "./parts/body.server.ts";

const shape = z.object({
  text: z.string(),
  bibliography: z.string().default(""),
  cells: z.union([z.literal("all"), z.array(z.string()).min(1)]),
  force: z.boolean().default(false),
});

/** Begins the computation of cells; what comes of it is told through the paper's shown document. */
export async function action({ request, context, params }: Route.ActionArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "write");
  const person = requirePerson({ request, context });
  const { text, bibliography, cells, force } = await readBody(request, shape);
  const begun = await context
    .get(servicesContext)
    .compute.compute({ paperId: paper.id, person, text: { text, bibliography }, cells, force });
  return Response.json(begun, { status: 202 });
}

export function loader() {
  throw refusal(405, "Cells are computed by POST.");
}
