import { data, Form, redirect } from "react-router";
import { refusal, requirePerson, signedOutHeaders, themeCookie } from "../access/index.server.ts";
import { databaseContext, servicesContext } from "../context.ts";
import { Button, Choice, Command, Field, RunningHead } from "../ui/index.ts";
import type { Route } from "./+types/settings";

const LONGEST_NAME = 100;

export async function loader({ request, context }: Route.LoaderArgs) {
  const person = requirePerson({ request, context });
  const theme: unknown = await themeCookie(context.get(servicesContext).config).parse(request.headers.get("Cookie"));
  return { name: person.name, email: person.email, theme: theme === "light" || theme === "dark" ? theme : "machine" };
}

export async function action({ request, context }: Route.ActionArgs) {
  const person = requirePerson({ request, context });
  const { config, texts } = context.get(servicesContext);
  const database = context.get(databaseContext);
  const form = await request.formData();
  const intent = form.get("intent");
  if (intent === "keep") {
    const name = String(form.get("name") ?? "")
      .trim()
      .replace(/\s+/g, " ");
    if (name === "" || name.length > LONGEST_NAME) {
      return data({ fault: `A name has 1 to ${LONGEST_NAME} letters; this one has ${name.length}.` }, { status: 422 });
    }
    await database.people.rename(person.id, name);
    const theme = form.get("theme");
    const cookie =
      theme === "light" || theme === "dark"
        ? await themeCookie(config).serialize(theme)
        : await themeCookie(config).serialize("", { maxAge: 0 });
    return redirect("/settings", { headers: { "Set-Cookie": cookie } });
  }
  if (intent === "sign-out-everywhere") {
    for (const hash of await database.sessions.endAll(person.id)) await texts.closeSession(hash);
    return redirect("/", { headers: await signedOutHeaders(config) });
  }
  throw refusal(400, "The form says nothing to be done.");
}

export default function Settings({ loaderData, actionData }: Route.ComponentProps) {
  const { name, email, theme } = loaderData;
  return (
    <>
      <title>Settings · Halfline</title>
      <RunningHead home="/shelf" right={<span className="head-name">{name}</span>} />
      <main className="px-[var(--margin)] pt-12 pb-16 w-full max-w-[740px] mx-auto">
        <h1 className="text-[38px] leading-[44px] mb-8">Settings</h1>
        <Form method="post" className="grid gap-7">
          <Field
            label="Your name, as coauthors see it"
            name="name"
            defaultValue={name}
            autoComplete="name"
            maxLength={LONGEST_NAME}
            required
            hint={email ? `GitHub gives ${email} as your address.` : "GitHub gives no address of yours."}
            fault={actionData?.fault}
          />
          <Choice label="Light or dark" name="theme" defaultValue={theme}>
            <option value="machine">As the machine is set</option>
            <option value="light">Light</option>
            <option value="dark">Dark</option>
          </Choice>
          <p>
            <Button name="intent" value="keep">
              Keep these
            </Button>
          </p>
        </Form>
        <div className="mt-14 pt-4 border-t border-ink flex flex-wrap gap-x-7 gap-y-2">
          <form method="post" action="/sign-out">
            <Command type="submit">Sign out</Command>
          </form>
          <form method="post">
            <Command type="submit" name="intent" value="sign-out-everywhere">
              Sign out on every machine
            </Command>
          </form>
        </div>
      </main>
    </>
  );
}
