import { requirePaper } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import { CommandLink, RunningHead } from "../ui/index.ts";
import type { Route } from "./+types/paper";

export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper, standing } = await requirePaper({ request, context }, params.paperId, "read");
  const { text } = await context.get(servicesContext).texts.read(paper.id);
  return { id: paper.id, title: paper.title, standing, text };
}

export default function Sheet({ loaderData }: Route.ComponentProps) {
  const { id, title, text } = loaderData;
  return (
    <>
      <title>{`${title} · Halfline`}</title>
      <RunningHead
        home="/shelf"
        title={title}
        right={
          <>
            <CommandLink to={`/papers/${id}/title-page`}>Title page</CommandLink>
            <CommandLink to={`/papers/${id}/galley`}>Galley</CommandLink>
          </>
        }
      />
      <main className="mx-auto w-full max-w-[var(--measure)] px-4 whitespace-pre-wrap">{text}</main>
    </>
  );
}
