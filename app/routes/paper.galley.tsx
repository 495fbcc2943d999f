import { requirePaper } from "../access/index.server.ts";
import { CommandLink, RunningHead } from "../ui/index.ts";
import type { Route } from "./+types/paper.galley";

export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper } = await requirePaper({ request, context }, params.paperId, "read");
  return { id: paper.id, title: paper.title };
}

export default function Galley({ loaderData }: Route.ComponentProps) {
  return (
    <>
      <title>{`Galley of ${loaderData.title} · Halfline`}</title>
      <RunningHead
        home="/shelf"
        title={loaderData.title}
        right={<CommandLink to={`/papers/${loaderData.id}`}>Back to the sheet</CommandLink>}
      />
      <main />
    </>
  );
}
