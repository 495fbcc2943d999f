import { redirect } from "react-router";
import { beginSession, completeSignIn, forgetAttempt } from "../access/index.server.ts";
import { databaseContext, servicesContext } from "../context.ts";
import type { Route } from "./+types/sign-in.github.callback";

/** GitHub sends the browser back here. */
export async function loader({ request, context }: Route.LoaderArgs) {
  const { config, log, texts } = context.get(servicesContext);
  const database = context.get(databaseContext);
  const headers = new Headers({ "Set-Cookie": await forgetAttempt(config), "Cache-Control": "no-store" });

  const outcome = await completeSignIn(config, request);
  if ("problem" in outcome) {
    if (outcome.problem !== "denied") log.warn({ problem: outcome.problem, err: outcome.cause }, "a sign-in failed");
    return redirect(`/sign-in?problem=${outcome.problem}`, { headers });
  }
  const person = await database.people.signIn(outcome.identity);
  const { setCookie, former } = await beginSession(config, database, person.id, request.headers.get("Cookie"));
  headers.append("Set-Cookie", setCookie);
  if (former !== null) await texts.closeSession(former);
  return redirect(outcome.returnTo, { headers });
}
