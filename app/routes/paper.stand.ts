import { z } from "zod";
import { refusal, requirePaper, requirePerson } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import type { Route } from "./+types/paper.stand";
import { readBody } from "./parts/body.server.ts";

const shape = z.object({ cell: z.string(), text: z.string() });

/** Lets an out-of-date result stand, on purpose. */
export async function action({ request, context, params }: Route.ActionArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "write");
  const person = requirePerson({ request, context });
  const { cell, text } = await readBody(request, shape);
  const { refused } = await context.get(servicesContext).compute.stand({ paperId: paper.id, person, cell, text });
  if (refused !== undefined) throw refusal(409, refused);
  return Response.json({ stands: true });
}

export function loader() {
  throw refusal(405, "A result is let stand by POST.");
}
