import { refusal, themeCookie } from "../access/index.server.ts";
import { servicesContext } from "../context.ts";
import type { Route } from "./+types/theme";

/** Keeps in the browser whether its pages are light or dark; asked for by a page that is so already. Nobody need be signed in. */
export async function action({ request, context }: Route.ActionArgs) {
  const theme = (await request.formData()).get("theme");
  if (theme !== "light" && theme !== "dark") throw refusal(400, "A page is `light` or `dark`.");
  const cookie = await themeCookie(context.get(servicesContext).config).serialize(theme);
  return new Response(null, { status: 204, headers: { "Set-Cookie": cookie } });
}
