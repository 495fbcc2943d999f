import { refusal, requirePaper } from "../access/index.server.ts";
import type { Route } from "./+types/paper.latex";

export async function loader({ request, context, params }: Route.LoaderArgs) {
  await requirePaper({ request, context }, params.paperId, "read");
  throw refusal(503, "The LaTeX source is being fitted.");
}
