import { redirect } from "react-router";
import { sessionHash, signedOutHeaders } from "../access/index.server.ts";
import { databaseContext, servicesContext } from "../context.ts";
import type { Route } from "./+types/sign-out";

/** Ends the session of this browser, and closes the sockets opened under it. */
export async function action({ request, context }: Route.ActionArgs) {
  const { config, texts } = context.get(servicesContext);
  const hash = await sessionHash(config, request.headers.get("Cookie"));
  if (hash !== null) {
    await context.get(databaseContext).sessions.end(hash);
    await texts.closeSession(hash);
  }
  return redirect("/", { headers: await signedOutHeaders(config) });
}

/** Somebody who opens the address of the form. */
export function loader() {
  return redirect("/");
}
