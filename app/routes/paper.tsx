import { requirePaper } from "../access/index.server.ts";
import { may } from "../access/index.ts";
import { servicesContext } from "../context.ts";
import { SheetPage, type Starts } from "../editor/index.ts";
import { useNonce } from "../ui/index.ts";
import type { Route } from "./+types/paper";

export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper, standing, person } = await requirePaper({ request, context }, params.paperId, "read");
  const { texts } = context.get(servicesContext);
  const [text, shown] = await Promise.all([texts.read(paper.id), texts.shown(paper.id)]);
  return {
    paperId: paper.id,
    title: paper.title,
    // A visitor of the specimen has no socket, signed in or not: the sheet is sent whole.
    person: standing === "visitor" || person === null ? null : { id: person.id, name: person.name },
    writes: may(standing, "write"),
    signIn: person === null ? `/sign-in?returnTo=${encodeURIComponent(`/papers/${paper.id}`)}` : "",
    first: { ...text, shown },
  };
}

export default function Sheet({ loaderData }: Route.ComponentProps) {
  const nonce = useNonce() ?? "";
  return (
    <>
      <title>{`${loaderData.title} · Halfline`}</title>
      <SheetPage {...loaderData} nonce={nonce} loadStarts={loadStarts} />
    </>
  );
}

async function loadStarts(): Promise<Starts> {
  const { layStart, STARTS } = await import("./parts/lay-start.ts");
  return { all: STARTS, lay: layStart };
}

/** The live sheet tells of the paper by itself: an action elsewhere on the page does not fetch the text again. */
export const shouldRevalidate = () => false;
