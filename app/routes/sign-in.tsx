import { redirect } from "react-router";
import { safeReturnTo } from "../access/index.ts";
import { personContext } from "../context.ts";
import { CommandLink, RunningHead } from "../ui/index.ts";
import type { Route } from "./+types/sign-in";
import { GithubButton } from "./parts/github-button.tsx";

const PROBLEMS: Readonly<Record<string, string>> = {
  denied: "You went back from GitHub without signing in.",
  stale: "That sign-in was begun in another window, or more than ten minutes ago. Begin again here.",
  unreachable: "GitHub does not answer. Try again in a few minutes.",
  refused: "GitHub did not accept the sign-in. Begin again here.",
};

export function loader({ request, context }: Route.LoaderArgs) {
  const query = new URL(request.url).searchParams;
  const returnTo = safeReturnTo(query.get("returnTo"), "/shelf");
  if (context.get(personContext)) throw redirect(returnTo);
  return { returnTo, problem: PROBLEMS[query.get("problem") ?? ""] ?? null };
}

export default function SignIn({ loaderData }: Route.ComponentProps) {
  const { returnTo, problem } = loaderData;
  return (
    <>
      <title>Sign in · Halfline</title>
      <RunningHead home="/" />
      <main className="px-[var(--margin)] pt-24 pb-16 w-full max-w-[740px] mx-auto">
        <h1 className="text-[38px] leading-[44px] mb-4">Sign in</h1>
        {problem ? (
          <p className="mb-4 text-rubric" role="alert">
            {problem}
          </p>
        ) : (
          <p className="mb-4 text-ink-2">Papers are open to their authors, referees and readers.</p>
        )}
        <div className="my-8">
          <GithubButton returnTo={returnTo} />
        </div>
        <CommandLink to="/specimen">Open the specimen paper, no account needed</CommandLink>
      </main>
    </>
  );
}
