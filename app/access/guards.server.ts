import { type RouterContextProvider, redirect } from "react-router";
import type { PaperRow } from "../../db/index.server.ts";
import { databaseContext, type Person, pageRequestContext, personContext } from "../context.ts";
import { may, type Right, type Standing } from "./roles.ts";

/** The parts of a loader's or an action's arguments that guards look at. */
export interface Asked {
  readonly request: Request;
  readonly context: Readonly<RouterContextProvider>;
}

export interface PaperAccess {
  readonly paper: PaperRow;
  readonly standing: Standing;
  readonly person: Person | null;
}

const REFUSED: Readonly<Record<Right, string>> = {
  read: "No such paper, or it is not open to you.",
  write: "Only the authors of this paper may do that.",
  own: "Only an owner of this paper may do that.",
};

/** An answer that refuses, for pages and for resource routes alike: the words are shown where it is caught. */
export function refusal(status: number, message: string): Response {
  return Response.json({ message }, { status });
}

/**
 * The person who asks.
 * @throws Response to the sign-in page for a page; 401 for everything else
 */
export function requirePerson(asked: Asked): Person {
  const person = asked.context.get(personContext);
  if (person) return person;
  throw askToSignIn(asked);
}

/**
 * The paper, for somebody who may do `right` with it.
 * To a stranger a paper that is not open looks like one that does not exist.
 * @throws Response: to the sign-in page or 401 when nobody is signed in and the paper is not the specimen; 404 to
 * strangers; 403 to members without the right
 */
export async function requirePaper(asked: Asked, paperId: string | undefined, right: Right): Promise<PaperAccess> {
  const person = asked.context.get(personContext);
  const found = await asked.context.get(databaseContext).papers.findFor(paperId ?? "", person?.id ?? null);
  const standing = found?.role ?? (found?.specimen ? "visitor" : null);
  if (!found || standing === null) {
    if (!person) throw askToSignIn(asked);
    throw refusal(404, REFUSED.read);
  }
  if (!may(standing, right)) {
    if (!person) throw askToSignIn(asked);
    throw refusal(403, REFUSED[right]);
  }
  const { role: _role, ...paper } = found;
  return { paper, standing, person };
}

function askToSignIn({ request, context }: Asked): Response {
  if (!context.get(pageRequestContext)) return refusal(401, "You are not signed in. Sign in and try again.");
  const { pathname, search } = new URL(request.url);
  return redirect(`/sign-in?${new URLSearchParams({ returnTo: pathname + search })}`);
}
