import { redirect } from "react-router";
import { personContext, servicesContext } from "../context.ts";
import { BRANCHING_CAPTION, BranchingPicture, CommandLink, Mark } from "../ui/index.ts";
import type { Route } from "./+types/welcome";
import { GithubButton } from "./parts/github-button.tsx";
import "./welcome.css";

export function loader({ context }: Route.LoaderArgs) {
  if (context.get(personContext)) throw redirect("/shelf");
  return { standIn: context.get(servicesContext).config.standIn };
}

export const meta: Route.MetaFunction = () => [
  { title: "Halfline · working papers whose numbers are computed" },
  { name: "description", content: "Write about branching diffusions and travelling fronts with your coauthors." },
];

export default function Welcome({ loaderData }: Route.ComponentProps) {
  return (
    <main className="welcome">
      <div className="welcome-words">
        <Mark to="/" />
        <div className="welcome-text">
          <h1>Working papers whose numbers are computed, not typed.</h1>
          <p>
            Write about branching diffusions and travelling fronts with your coauthors. Figures, tables and the numbers
            in your sentences follow the parameters at the head of the paper.
          </p>
          <GithubButton returnTo="/shelf" />
          {loaderData.standIn ? (
            <p className="welcome-note">
              This is a demo: invented people stand in for GitHub’s, on this machine alone.
            </p>
          ) : null}
          <CommandLink to="/specimen">Open the specimen paper, no account needed</CommandLink>
        </div>
      </div>
      <figure className="welcome-picture">
        <BranchingPicture />
        <figcaption>{BRANCHING_CAPTION}</figcaption>
      </figure>
    </main>
  );
}
