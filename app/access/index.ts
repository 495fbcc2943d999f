export { safeReturnTo } from "./return-to.ts";
export type { Right, Standing } from "./roles.ts";
export { may } from "./roles.ts";
