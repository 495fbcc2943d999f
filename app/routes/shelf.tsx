import { Form } from "react-router";
import { refusal, requirePerson } from "../access/index.server.ts";
import { databaseContext } from "../context.ts";
import { Button, Command, CommandLink, Field, RunningHead, TailLine } from "../ui/index.ts";
import type { Route } from "./+types/shelf";
import { DeleteDialog } from "./parts/delete-dialog.tsx";
import { SHELF_ACTIONS } from "./parts/shelf-actions.server.ts";
import { groupShelf } from "./parts/shelf-groups.ts";
import { ShelfPaperRow } from "./parts/shelf-paper.tsx";
import { STARTING_POINTS } from "./parts/starts.ts";
import "./shelf.css";

export async function loader({ request, context }: Route.LoaderArgs) {
  const person = requirePerson({ request, context });
  const query = new URL(request.url).searchParams;
  const find = (query.get("find") ?? "").trim().slice(0, 200);
  const rows = await context.get(databaseContext).papers.shelf(person.id, find);
  const papers = rows.map((row) => ({ ...row, changedAt: row.changedAt.toISOString() }));
  const chosen = papers.find((paper) => paper.id === query.get("delete") && paper.role === "owner");
  return {
    name: person.name,
    find,
    groups: groupShelf(papers),
    count: papers.length,
    deleting: chosen ? { id: chosen.id, title: chosen.title } : null,
    now: new Date().toISOString(),
  };
}

export async function action({ request, context }: Route.ActionArgs): Promise<unknown> {
  const form = await request.formData();
  const act = SHELF_ACTIONS.get(form.get("intent"));
  if (!act) throw refusal(400, "The form says nothing to be done.");
  return act({ request, context }, form);
}

export default function Shelf({ loaderData, actionData }: Route.ComponentProps) {
  const { name, find, groups, count, deleting, now } = loaderData;
  const fault = actionData as { fault: string } | undefined;
  return (
    <>
      <title>Shelf · Halfline</title>
      <RunningHead
        home="/shelf"
        right={
          <>
            <span className="head-name">{name}</span>
            <CommandLink to="/manual">Manual</CommandLink>
            <CommandLink to="/settings">Settings</CommandLink>
          </>
        }
      />
      <main className="shelf">
        <div className="shelf-head">
          <h1>Shelf</h1>
          <div className="shelf-tools">
            <Form method="get" role="search" className="shelf-find">
              <Field label="Find a title or an author" type="search" name="find" defaultValue={find} key={find} />
            </Form>
            <Form method="post">
              <Button name="intent" value="begin">
                Begin a paper
              </Button>
            </Form>
          </div>
        </div>
        <StartFrom />
        {groups.map((group) => (
          <section key={group.name}>
            <h2 className="shelf-group">{group.name}</h2>
            {group.papers.length > 0 ? (
              <ul>
                {group.papers.map((paper) => (
                  <ShelfPaperRow key={paper.id} paper={paper} you={name} now={now} />
                ))}
              </ul>
            ) : (
              <Nothing find={find} />
            )}
          </section>
        ))}
      </main>
      <TailLine left={count === 1 ? "1 paper" : `${count} papers`} />
      {deleting ? <DeleteDialog paper={deleting} fault={fault?.fault ?? null} /> : null}
    </>
  );
}

/** Papers of ours to begin from: they compute as they are. */
function StartFrom() {
  return (
    <Form method="post" className="shelf-starts">
      <input type="hidden" name="intent" value="begin" />
      Or begin from{" "}
      {STARTING_POINTS.map(({ id, words }, i) => (
        <span key={id}>
          {i === 0 ? "" : i === STARTING_POINTS.length - 1 ? " or " : ", "}
          <Command type="submit" name="start" value={id}>
            {words}
          </Command>
        </span>
      ))}
      .
    </Form>
  );
}

function Nothing({ find }: { readonly find: string }) {
  if (find !== "") {
    return (
      <p className="shelf-empty">
        No paper on the desk with “{find}” in its title or authors. <CommandLink to="/shelf">Show all</CommandLink>
      </p>
    );
  }
  return (
    <Form method="post" className="shelf-empty">
      Nothing on the desk yet.{" "}
      <Command type="submit" name="intent" value="begin">
        Begin a paper
      </Command>
      , or <CommandLink to="/specimen">open the specimen paper</CommandLink>.
    </Form>
  );
}
