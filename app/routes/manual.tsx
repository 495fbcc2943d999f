import { personContext } from "../context.ts";
import { manualContents } from "../manual/index.server.ts";
import { ManualPage } from "../manual/index.ts";
import type { Route } from "./+types/manual";

/** Open to anyone. */
export function loader({ context }: Route.LoaderArgs) {
  return { home: context.get(personContext) ? "/shelf" : "/", contents: manualContents() };
}

export default function Manual({ loaderData }: Route.ComponentProps) {
  return (
    <>
      <title>Manual · Halfline</title>
      <ManualPage {...loaderData} />
    </>
  );
}
