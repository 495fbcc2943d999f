import { beginSignIn } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import type { Route } from "./+types/sign-in.github";

/** Begins a sign-in. A form posts here, so that no other site can begin one in this browser. */
export async function action({ request, context }: Route.ActionArgs) {
  const form = await request.formData();
  return beginSignIn(context.get(servicesContext).config, request, form.get("returnTo"));
}
