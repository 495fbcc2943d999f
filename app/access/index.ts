export { safeReturnTo } from "./return-to.ts";
export type { Standing } from "./roles.ts";
export { may } from "./roles.ts";
