/** The worker's entry when the server runs from its sources: a thread does not inherit the loader of TypeScript. */
import { register } from "tsx/esm/api";

register();
export const { compute, part, merge, plan } = await import("./worker.ts");
