import { redirect } from "react-router";
import { refusal } from "../access/index.server.ts";
import { databaseContext } from "../context.ts";
import type { Route } from "./+types/specimen";

/** Leads to the open example, wherever it stands. */
export async function loader({ context }: Route.LoaderArgs) {
  const specimen = await context.get(databaseContext).papers.findSpecimen();
  if (!specimen) throw refusal(404, "There is no specimen paper on this Halfline.");
  return redirect(`/papers/${specimen.id}`);
}
