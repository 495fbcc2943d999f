import { createRequestHandler } from "@react-router/express";
import type { RequestHandler } from "express";
import { RouterContextProvider } from "react-router";
import { readSession } from "../app/access/index.server.ts";
import {
  databaseContext,
  nonceContext,
  pageRequestContext,
  personContext,
  type Services,
  servicesContext,
} from "../app/context.ts";
import type { Database } from "../db/index.server.ts";

/** What the process hands over to the pages. */
export interface PageParts {
  readonly database: Database;
  readonly services: Services;
  /** Faults are shown with their stacks. */
  readonly development: boolean;
}

/**
 * The pages as an Express handler. This file belongs to the bundle of the pages, because the contexts it sets
 * are compared by identity; all else of server/ belongs to the process.
 */
export function makeHandler(parts: PageParts): RequestHandler {
  const { database, services } = parts;
  return createRequestHandler({
    build: () => import("virtual:react-router/server-build"),
    mode: parts.development ? "development" : "production",
    async getLoadContext(request, response) {
      const context = new RouterContextProvider();
      context.set(databaseContext, database);
      context.set(servicesContext, services);
      const session = await readSession(services.config, database, request.get("Cookie"));
      context.set(personContext, session?.person ?? null);
      context.set(
        pageRequestContext,
        request.path.endsWith(".data") || (request.get("Accept") ?? "").includes("text/html"),
      );
      context.set(nonceContext, response.locals.nonce as string);
      return context;
    },
  });
}
