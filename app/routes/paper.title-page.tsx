import { requirePaper } from "../access/index.server.ts";
import type { Route } from "./+types/paper.title-page";

export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "read");
  return { title: paper.title };
}

export default function TitlePage({ loaderData }: Route.ComponentProps) {
  return <main>{loaderData.title}</main>;
}
