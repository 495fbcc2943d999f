export type { ComputeOptions } from "./service.ts";
export { Computations } from "./service.ts";
