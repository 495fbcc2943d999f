import { RouterContextProvider } from "react-router";
import { afterAll, beforeAll, expect, test } from "vitest";
import {
  type ComputeService,
  databaseContext,
  type Person,
  pageRequestContext,
  personContext,
  type Services,
  servicesContext,
} from "../../app/context.ts";
import { action as cancel } from "../../app/routes/paper.cancel.ts";
import { action as compute } from "../../app/routes/paper.compute.ts";
import { loader as results } from "../../app/routes/paper.results.ts";
import { action as stand } from "../../app/routes/paper.stand.ts";
import { type Database, openDatabase, type Role } from "../../db/index.server.ts";
import { someone } from "../support/cast.ts";
import { freshDatabase } from "../support/database.ts";

const KEY = "a".repeat(64);
const ROLES: readonly Role[] = ["owner", "author", "referee", "reader"];

let database: Database;
let close = async (): Promise<void> => {};
const people = new Map<Role | "stranger", Person>();

beforeAll(async () => {
  const knex = await freshDatabase((end) => {
    close = end;
  });
  database = openDatabase(knex);
  const owner = await someone(database, "owner");
  await database.papers.create({ id: "paper-00001", title: "T", authors: "A" }, owner.id);
  people.set("owner", owner);
  for (const role of ROLES.slice(1)) {
    const person = await someone(database, role);
    await database.members.add("paper-00001", person.id, role);
    people.set(role, person);
  }
  people.set("stranger", await someone(database, "stranger"));
});

afterAll(() => close());

/** A service that notes what it is asked; what it does itself has its own tests (tests/server). */
function noting(): { service: ComputeService; asked: string[] } {
  const asked: string[] = [];
  return {
    asked,
    service: {
      compute: async ({ paperId, cells, person }) => {
        asked.push(`compute ${paperId} ${cells} ${person.name}`);
        return { accepted: ["K"] };
      },
      cancel: async ({ paperId, cells }) => void asked.push(`cancel ${paperId} ${cells}`),
      stand: async ({ cell }) => {
        asked.push(`stand ${cell}`);
        return cell === "K" ? {} : { refused: "It is current: it stands as it is." };
      },
      results: async (paperId, keys) => {
        asked.push(`results ${paperId} ${keys}`);
        return {};
      },
    },
  };
}

interface Asking {
  readonly by: Role | "stranger" | null;
  readonly body?: unknown;
  readonly query?: string;
  readonly service: ComputeService;
}

type Handler = (args: never) => Promise<Response>;

/** Status and body of a route's answer, thrown or returned. */
async function answer(handler: Handler, { by, body, query = "", service }: Asking): Promise<[number, unknown]> {
  const context = new RouterContextProvider();
  context.set(databaseContext, database);
  context.set(personContext, by === null ? null : (people.get(by) ?? null));
  context.set(pageRequestContext, false);
  context.set(servicesContext, { compute: service } as Services);
  const request = new Request(`http://localhost/papers/paper-00001/x${query}`, {
    ...(body === undefined ? {} : { method: "POST", body: typeof body === "string" ? body : JSON.stringify(body) }),
  });
  const args = { request, context, params: { paperId: "paper-00001" } };
  const response = await handler(args as never).catch((thrown: unknown) => {
    if (thrown instanceof Response) return thrown;
    throw thrown;
  });
  return [response.status, await response.json()];
}

const WRITES: readonly (readonly [string, Handler, unknown])[] = [
  ["compute", compute, { text: "x", cells: "all" }],
  ["cancel", cancel, { cells: ["K"] }],
  ["stand", stand, { cell: "K", text: "x" }],
];

test.each(WRITES)("%s is for owner and authors", async (_name, handler, body) => {
  const { service, asked } = noting();
  for (const role of ROLES) {
    const [status] = await answer(handler, { by: role, body, service });
    expect([role, status < 300]).toEqual([role, role === "owner" || role === "author"]);
  }
  expect(asked).toHaveLength(2);
  expect((await answer(handler, { by: "stranger", body, service }))[0]).toBe(404);
  expect((await answer(handler, { by: null, body, service }))[0]).toBe(401);
  expect(asked).toHaveLength(2);
});

test.each(WRITES)("%s refuses a body that does not fit", async (_name, handler) => {
  const { service, asked } = noting();
  for (const body of ["{", {}, { cells: 3, cell: 4 }]) {
    expect((await answer(handler, { by: "owner", body, service }))[0]).toBe(400);
  }
  expect(asked).toEqual([]);
});

test("the answers say what was accepted, and why a result may not stand", async () => {
  const { service } = noting();
  const body = { text: "x", cells: ["K"] };
  expect(await answer(compute, { by: "author", body, service })).toEqual([202, { accepted: ["K"] }]);
  const [status, words] = await answer(stand, { by: "author", body: { cell: "T", text: "x" }, service });
  expect(status).toBe(409);
  expect(words).toEqual({ message: "It is current: it stands as it is." });
});

test("results are for all who may read, by proper keys only", async () => {
  const { service, asked } = noting();
  for (const role of ROLES) {
    expect((await answer(results, { by: role, query: `?keys=${KEY}`, service }))[0]).toBe(200);
  }
  expect(asked).toEqual(ROLES.map(() => `results paper-00001 ${KEY}`));
  expect((await answer(results, { by: "stranger", query: `?keys=${KEY}`, service }))[0]).toBe(404);
  expect((await answer(results, { by: "owner", query: "?keys=../x", service }))[0]).toBe(400);
});
