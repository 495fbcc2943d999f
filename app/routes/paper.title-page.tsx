import "katex/dist/katex.min.css";
import { data, redirect } from "react-router";
import { requirePaper } from "../access/index.server.ts";
import { databaseContext, servicesContext } from "../context.ts";
import { readPaper } from "../paper/index.ts";
import { CommandLink, RunningHead } from "../ui/index.ts";
import type { Route } from "./+types/paper.title-page";
import { FrontMatterBlock } from "./parts/front-matter.tsx";
import { changePeople } from "./parts/people.server.ts";
import { groupPeople } from "./parts/people-groups.ts";
import { PeopleList } from "./parts/people-list.tsx";
import { paragraphsOf, phrasesOf } from "./parts/phrases.server.ts";
import "./title-page.css";

export async function loader({ request, context, params }: Route.LoaderArgs) {
  const { paper, standing, person } = await requirePaper({ request, context }, params.paperId, "read");
  const { text, bibliography } = await context.get(servicesContext).texts.read(paper.id);
  const { front } = readPaper(text, bibliography);
  // Whoever comes without being on the paper is not told who is.
  const members = standing === "visitor" ? [] : await context.get(databaseContext).members.list(paper.id);
  return {
    id: paper.id,
    name: paper.title,
    front: { authors: front.authors, keywords: front.keywords, msc: front.msc },
    title: phrasesOf(front.titleNodes, front.macros),
    abstract: paragraphsOf(front),
    groups: groupPeople(members, { standing, personId: person?.id ?? null }),
    you: person?.id ?? "",
    standing,
    changing: new URL(request.url).searchParams.get("change"),
  };
}

export async function action({ request, context, params }: Route.ActionArgs) {
  const { fault, left } = await changePeople({ request, context }, params.paperId, await request.formData());
  if (left) return redirect("/shelf");
  return fault ? data({ fault }, { status: 422 }) : redirect(`/papers/${params.paperId}/title-page`);
}

export default function TitlePage({ loaderData, actionData }: Route.ComponentProps) {
  const { id, name, front, title, abstract, groups, you, standing, changing } = loaderData;
  const writes = standing === "owner" || standing === "author";
  return (
    <>
      <title>{`Title page of ${name} · Halfline`}</title>
      <RunningHead
        home={you ? "/shelf" : "/"}
        title={name}
        right={
          <>
            <CommandLink to={`/papers/${id}`}>Back to the sheet</CommandLink>
            <CommandLink to={`/papers/${id}/galley`}>Galley</CommandLink>
          </>
        }
      />
      <main className="title-page">
        <FrontMatterBlock front={front} name={name} title={title} abstract={abstract} />
        {writes ? (
          <p className="front-hint">
            This stands at the head of the sheet, between the lines of three hyphens, and is changed there.
          </p>
        ) : null}
        {standing === "visitor" ? null : (
          <PeopleList
            groups={groups}
            you={you}
            owns={standing === "owner"}
            changing={changing}
            fault={actionData?.fault ?? null}
          />
        )}
      </main>
    </>
  );
}
