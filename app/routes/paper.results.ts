import { refusal, requirePaper } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import type { Route } from "./+types/paper.results";

const MOST_KEYS = 200;
const KEY = /^[0-9a-f]{64}$/;

/** Results that this paper has shown, by key. */
export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "read");
  const keys = (new URL(request.url).searchParams.get("keys") ?? "").split(",").filter((key) => key !== "");
  if (keys.length > MOST_KEYS || !keys.every((key) => KEY.test(key))) {
    throw refusal(400, `Ask for at most ${MOST_KEYS} keys of 64 hexadecimal digits, parted by commas.`);
  }
  const results = await context.get(servicesContext).compute.results(paper.id, keys);
  // A result never changes under its key; only the right to see it may.
  return Response.json(results, { headers: { "Cache-Control": "private, no-cache" } });
}
