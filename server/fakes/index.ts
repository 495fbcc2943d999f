export type { StandIn, StandInClient } from "./github.ts";
export { startGithubStandIn } from "./github.ts";
export type { DemoPerson } from "./people.ts";
export { DEMO_PEOPLE } from "./people.ts";
