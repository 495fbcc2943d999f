import { z } from "zod";
import { refusal, requirePaper, requirePerson } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import type { Route } from "./+types/paper.cancel";
import { readBody } from "./parts/body.server.ts";

const shape = z.object({ cells: z.union([z.literal("all"), z.array(z.string()).min(1)]) });

/** Cancels computations of this paper that are under way or wait. */
export async function action({ request, context, params }: Route.ActionArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "write");
  const person = requirePerson({ request, context });
  const { cells } = await readBody(request, shape);
  await context.get(servicesContext).compute.cancel({ paperId: paper.id, person, cells });
  return Response.json({ cancelled: true });
}

export function loader() {
  throw refusal(405, "Computations are cancelled by POST.");
}
