import { afterAll, beforeAll, expect, test } from "vitest";
import { connect } from "../../db/index.server.ts";
import { Browser, form, hiddenFields } from "../support/browser.ts";
import { type BuiltServer, startBuiltServer } from "../support/built-server.ts";

/** The built server, asked as browsers and scripts ask it: signing in, the shelf, and what strangers see. */

let server: BuiltServer;
beforeAll(async () => {
  server = await startBuiltServer();
}, 90_000);
afterAll(async () => {
  await server?.stop();
});

/** Signs in at the stand-in by pressing the button with the person's name. */
async function signedIn(subject: string, returnTo = "/shelf"): Promise<{ browser: Browser; at: string }> {
  const browser = new Browser();
  const page = await browser.open(`${server.url}/sign-in/github`, form({ returnTo }));
  const { origin } = new URL(page.at);
  const back = await browser.open(
    `${origin}/login/oauth/authorize`,
    form({ ...hiddenFields(await page.text()), subject }),
  );
  return { browser, at: back.at.replace(server.url, "") };
}

async function begun(browser: Browser): Promise<string> {
  const sheet = await browser.ask(`${server.url}/shelf`, form({ intent: "begin" }));
  return /^\/papers\/([\w-]+)$/.exec(sheet.headers.get("Location") ?? "")?.[1] ?? "";
}

const INES = "9001";
const TORMOD = "9002";
const STRANGER = "9005";

test("the first page offers to sign in and the specimen, and holds no script without the nonce", async () => {
  const page = await new Browser().open(`${server.url}/`);
  const html = await page.text();
  expect(page.status).toBe(200);
  expect(html).toContain("Sign in with GitHub");
  expect(html).toContain("Open the specimen paper, no account needed");
  const nonce = /'nonce-([^']+)'/.exec(page.headers.get("Content-Security-Policy") ?? "")?.[1];
  const scripts = html.match(/<script\b[^>]*>/g) ?? [];
  expect(scripts.length).toBeGreaterThan(0);
  expect(scripts.filter((script) => !script.includes(`nonce="${nonce}"`))).toEqual([]);
});

test("a guest is led through the sign-in to where they wanted to go, with a cookie no script can read", async () => {
  const guest = new Browser();
  const asked = await guest.open(`${server.url}/settings`);
  expect(asked.at).toBe(`${server.url}/sign-in?returnTo=%2Fsettings`);
  const { browser, at } = await signedIn(INES, "/settings");
  expect(at).toBe("/settings");
  expect(await (await browser.open(`${server.url}/settings`)).text()).toContain("Inês Valadão");

  const again = await browser.ask(`${server.url}/sign-in/github`, form({ returnTo: "/shelf" }));
  for (const cookie of again.headers.getSetCookie()) expect(cookie).toMatch(/HttpOnly/i);
  for (const cookie of again.headers.getSetCookie()) expect(cookie).toMatch(/SameSite=Lax/i);
});

test("signing in again changes the session, and the former one is dead", async () => {
  const { browser } = await signedIn(INES);
  const former = browser.cookies(server.url);
  const page = await browser.open(`${server.url}/sign-in/github`, form({ returnTo: "/shelf" }));
  const { origin } = new URL(page.at);
  await browser.open(`${origin}/login/oauth/authorize`, form({ ...hiddenFields(await page.text()), subject: INES }));
  expect(browser.cookies(server.url)).not.toBe(former);
  const answer = await fetch(`${server.url}/shelf`, {
    headers: { Cookie: former, Accept: "text/html" },
    redirect: "manual",
  });
  expect(answer.headers.get("Location")).toContain("/sign-in");
});

test("signing out ends the session on the server, not only in the browser", async () => {
  const { browser } = await signedIn(INES);
  const cookie = browser.cookies(server.url);
  const out = await browser.ask(`${server.url}/sign-out`, form({}));
  expect([out.headers.get("Location"), out.headers.get("Clear-Site-Data")]).toEqual(["/", '"storage"']);
  expect(browser.cookies(server.url)).not.toContain("session");
  const answer = await fetch(`${server.url}/shelf`, {
    headers: { Cookie: cookie, Accept: "text/html" },
    redirect: "manual",
  });
  expect(answer.headers.get("Location")).toContain("/sign-in");
});

test("signing out everywhere ends the other browsers' sessions", async () => {
  const [one, other] = [await signedIn(TORMOD), await signedIn(TORMOD)];
  await one.browser.open(`${server.url}/settings`, form({ intent: "sign-out-everywhere" }));
  expect((await other.browser.open(`${server.url}/shelf`)).at).toContain("/sign-in");
});

test("one's name is as one writes it, and stays so at the next sign-in", async () => {
  const { browser } = await signedIn("9004");
  const keep = (name: string) =>
    browser.open(`${server.url}/settings`, form({ intent: "keep", name, theme: "machine" }));
  expect((await keep("  ")).status).toBe(422);
  expect((await keep("x".repeat(101))).status).toBe(422);
  expect(await (await keep("  R.   Sim ")).text()).toContain('value="R. Sim"');
  const again = await signedIn("9004", "/settings");
  expect(await (await again.browser.open(`${server.url}/settings`)).text()).toContain('value="R. Sim"');
});

test("a sign-in that failed says why", async () => {
  const stale = await new Browser().open(`${server.url}/sign-in/github/callback?code=x&state=y`);
  expect(await stale.text()).toContain("begun in another window");
  const browser = new Browser();
  const page = await browser.open(`${server.url}/sign-in/github`, form({ returnTo: "/shelf" }));
  const { origin } = new URL(page.at);
  const back = await browser.open(
    `${origin}/login/oauth/authorize`,
    form({ ...hiddenFields(await page.text()), subject: "" }),
  );
  expect(await back.text()).toContain("without signing in");
});

test("a paper is begun, duplicated, put by, brought back, and deleted when its title is written", async () => {
  const { browser } = await signedIn(INES);
  const id = await begun(browser);
  const shelf = async () => (await browser.open(`${server.url}/shelf`)).text();
  expect((await browser.open(`${server.url}/papers/${id}`)).status).toBe(200);
  expect(await shelf()).toContain(`/papers/${id}"`);

  await browser.open(`${server.url}/shelf`, form({ intent: "duplicate", paper: id }));
  expect(await shelf()).toContain("Copy of Untitled paper");
  await browser.open(`${server.url}/shelf`, form({ intent: "put-by", paper: id }));
  expect(await shelf()).toMatch(/Put by<\/h2>/);
  await browser.open(`${server.url}/shelf`, form({ intent: "bring-back", paper: id }));
  expect(await shelf()).not.toMatch(/Put by<\/h2>/);

  const wrong = await browser.open(
    `${server.url}/shelf?delete=${id}`,
    form({ intent: "delete", paper: id, title: "No" }),
  );
  expect([wrong.status, (await wrong.text()).includes("That is not its title")]).toEqual([422, true]);
  await browser.open(`${server.url}/shelf`, form({ intent: "delete", paper: id, title: " Untitled  paper " }));
  expect(await shelf()).not.toContain(`/papers/${id}"`);
  expect((await browser.open(`${server.url}/papers/${id}`)).status).toBe(404);
});

test("coauthors are added by their login and see the paper from then on; a reader may not add anybody", async () => {
  const ines = await signedIn(INES);
  const tormod = await signedIn(TORMOD);
  const id = await begun(ines.browser);
  const page = `${server.url}/papers/${id}/title-page`;
  expect((await tormod.browser.open(page)).status).toBe(404);

  const add = (browser: Browser, login: string, role: string) =>
    browser.open(page, form({ intent: "add", login, role }));
  const nobody = await add(ines.browser, "nobody-here", "reader");
  expect([nobody.status, (await nobody.text()).includes("Nobody has signed in as")]).toEqual([422, true]);
  expect((await add(ines.browser, "@Tormod-Hagelund", "reader")).status).toBe(200);
  expect(await (await tormod.browser.open(page)).text()).toContain("Inês Valadão");
  expect(await (await tormod.browser.open(`${server.url}/shelf`)).text()).toContain("You are a reader");
  expect((await add(tormod.browser, "dipankar-lahiri", "author")).status).toBe(403);

  expect((await tormod.browser.open(page, form({ intent: "leave" }))).at).toBe(`${server.url}/shelf`);
  expect((await tormod.browser.open(page)).status).toBe(404);
  const last = await ines.browser.open(page, form({ intent: "leave" }));
  expect([last.status, (await last.text()).includes("at least one owner")]).toEqual([422, true]);
});

const PAGES = ["", "/title-page", "/galley"];
const READS = ["/results?keys=", "/latex.zip", "/paper.pdf"];
const WRITES = ["/compute", "/cancel", "/stand"];

test("a stranger sees nothing of a paper, neither as a page nor as a resource", async () => {
  const { browser: ines } = await signedIn(INES);
  const id = await begun(ines);
  const { browser: stranger } = await signedIn(STRANGER);
  for (const path of [...PAGES, ...READS]) {
    const there = await stranger.open(`${server.url}/papers/${id}${path}`);
    const notThere = await stranger.open(`${server.url}/papers/AAAAAAAAAAAA${path}`);
    const words = (text: string) => text.includes("No such paper, or it is not open to you.");
    expect([path, there.status, words(await there.text())]).toEqual([path, 404, true]);
    expect([path, notThere.status, words(await notThere.text())]).toEqual([path, 404, true]);
  }
  for (const path of WRITES) {
    const headers = { "Content-Type": "application/json", Accept: "*/*" };
    const body = JSON.stringify({ text: "", cells: "all", cell: "x" });
    const answer = await stranger.ask(`${server.url}/papers/${id}${path}`, { method: "POST", headers, body });
    expect([path, answer.status]).toEqual([path, 404]);
    const guest = await new Browser().ask(`${server.url}/papers/${id}${path}`, { method: "POST", headers, body });
    expect([path, guest.status]).toEqual([path, 401]);
  }
});

test("another site's page can change nothing with this browser's cookies", async () => {
  const { browser } = await signedIn(INES);
  const id = await begun(browser);
  for (const path of [
    "/shelf",
    "/settings",
    "/sign-out",
    "/sign-in/github",
    ...WRITES.map((path) => `/papers/${id}${path}`),
  ]) {
    const answer = await browser.ask(`${server.url}${path}`, {
      ...form({ intent: "begin" }),
      headers: { Origin: "http://evil.test" },
    });
    expect([path, answer.status]).toEqual([path, 403]);
  }
});

test("everybody reads the specimen, and only its authors change it", async () => {
  const { browser } = await signedIn(INES);
  expect((await new Browser().open(`${server.url}/specimen`)).status).toBe(404);
  const id = await begun(browser);
  const knex = connect(server.databaseUrl);
  await knex("papers").where({ id }).update({ specimen: true });
  await knex.destroy();
  const guest = new Browser();
  const page = await guest.open(`${server.url}/specimen`);
  expect([page.status, page.at]).toEqual([200, `${server.url}/papers/${id}`]);
  const titlePage = await (await guest.open(`${server.url}/papers/${id}/title-page`)).text();
  expect(titlePage).toContain("Untitled paper");
  expect(titlePage).not.toContain("Who may do what");
  const remove = await browser.open(
    `${server.url}/shelf`,
    form({ intent: "delete", paper: id, title: "Untitled paper" }),
  );
  expect(remove.status).toBe(403);
});

test("pages of ours say what is wrong: nothing here, and bodies that cannot be read", async () => {
  const nothing = await new Browser().open(`${server.url}/nothing/here`);
  expect([nothing.status, (await nothing.text()).includes("There is no page at this address.")]).toEqual([404, true]);
  const { browser } = await signedIn(INES);
  const id = await begun(browser);
  const headers = { "Content-Type": "application/json", Accept: "*/*" };
  const post = async (body: string) => {
    const answer = await browser.ask(`${server.url}/papers/${id}/compute`, { method: "POST", headers, body });
    return [answer.status, ((await answer.json()) as { message: string }).message];
  };
  expect(await post("{")).toEqual([400, "The body is not JSON."]);
  const [status, message] = await post(JSON.stringify({ cells: 3 }));
  expect([status, message]).toEqual([400, expect.stringContaining("text:")]);
  const answer = await browser.ask(`${server.url}/papers/${id}/results?keys=drop`);
  expect(answer.status).toBe(400);
});

test("a fault of the inside shows its page, without words or stack of the inside, and the log has them", async () => {
  const { browser } = await signedIn(INES);
  const id = await begun(browser);
  const knex = connect(server.databaseUrl);
  await knex.raw("alter table members rename to members_away");
  try {
    for (const path of [`/papers/${id}`, "/shelf", `/papers/${id}/results?keys=`]) {
      const page = await browser.open(`${server.url}${path}`);
      const words = await page.text();
      expect([path, page.status]).toEqual([path, 500]);
      expect(words).not.toMatch(/members|knex|node_modules|\bat [^<]*:\d+:\d+/);
    }
    expect(server.output()).toContain("members");
  } finally {
    await knex.raw("alter table members_away rename to members");
    await knex.destroy();
  }
});

test("whether pages are light or dark is kept for anyone, and other words are not", async () => {
  const guest = new Browser();
  const ask = (theme: string) => guest.ask(`${server.url}/theme`, form({ theme }));
  expect((await ask("dark")).status).toBe(204);
  expect(await (await guest.open(`${server.url}/`)).text()).toMatch(/<html[^>]* data-theme="dark"/);
  expect((await ask("light")).status).toBe(204);
  expect(await (await guest.open(`${server.url}/`)).text()).toMatch(/<html[^>]* data-theme="light"/);
  expect((await ask('dark" onload="')).status).toBe(400);
});
