import { data, redirect } from "react-router";
import { type Asked, refusal, requirePaper, requirePerson } from "../../access/index.server.ts";
import { databaseContext, servicesContext } from "../../context.ts";
import { readPaper } from "../../paper/index.ts";
import { copyOf } from "./new-paper.ts";
import { placePaper } from "./place-paper.server.ts";
import { startingPoint } from "./starts.ts";

type ShelfAction = (asked: Asked, form: FormData) => Promise<unknown>;

/** What may be done on the shelf, by the name of the form's button. */
export const SHELF_ACTIONS: ReadonlyMap<unknown, ShelfAction> = new Map(
  Object.entries({ begin, duplicate, "put-by": putBy, "bring-back": bringBack, delete: deleteForEver }),
);

async function begin(asked: Asked, form: FormData): Promise<Response> {
  const person = requirePerson(asked);
  const start = startingPoint(form.get("start"));
  const text = { text: start.text(person.name), bibliography: start.bibliography };
  const title = readPaper(text.text, "").front.title;
  const id = await placePaper(asked.context, person, { title, authors: person.name }, text);
  await asked.context.get(servicesContext).compute.compute({ paperId: id, person, text, cells: "all" });
  return redirect(`/papers/${id}`);
}

async function duplicate(asked: Asked, form: FormData): Promise<Response> {
  const person = requirePerson(asked);
  const { paper } = await requirePaper(asked, idOf(form), "read");
  const { texts, compute } = asked.context.get(servicesContext);
  const original = await texts.read(paper.id);
  const copy = copyOf(original.text);
  const text = { text: copy.text, bibliography: original.bibliography };
  const words = { title: copy.title ?? paper.title, authors: paper.authors };
  const id = await placePaper(asked.context, person, words, text);
  // Every result is found under its key.
  await compute.compute({ paperId: id, person, text, cells: "all" });
  return redirect("/shelf");
}

async function putBy(asked: Asked, form: FormData): Promise<Response> {
  return shift(asked, form, true);
}

async function bringBack(asked: Asked, form: FormData): Promise<Response> {
  return shift(asked, form, false);
}

async function shift(asked: Asked, form: FormData, by: boolean): Promise<Response> {
  const person = requirePerson(asked);
  const { paper } = await requirePaper(asked, idOf(form), "read");
  await asked.context.get(databaseContext).members.putBy(paper.id, person.id, by);
  return redirect("/shelf");
}

async function deleteForEver(asked: Asked, form: FormData): Promise<unknown> {
  const { paper } = await requirePaper(asked, idOf(form), "own");
  if (paper.specimen) throw refusal(403, "The specimen paper is open to everybody and cannot be deleted.");
  const written = form.get("title");
  if (typeof written !== "string" || squeezed(written) !== squeezed(paper.title)) {
    return data({ fault: `That is not its title. It is: ${paper.title}` }, { status: 422 });
  }
  await asked.context.get(databaseContext).papers.remove(paper.id);
  await asked.context.get(servicesContext).texts.closeSockets(paper.id, null);
  return redirect("/shelf");
}

function idOf(form: FormData): string {
  const id = form.get("paper");
  if (typeof id !== "string") throw refusal(400, "The form names no paper.");
  return id;
}

/** Spaces at the ends and several in a row are no difference between titles. */
function squeezed(words: string): string {
  return words.trim().replace(/\s+/g, " ").normalize("NFC");
}
