import type { KeyDocumentation } from "../kind.ts";

/** Keys of the kinds that read a process, said once for all of them. */

export const OF_A_PROCESS: KeyDocumentation = { name: "of", meaning: "a process", required: true, fallback: null };

export const START: KeyDocumentation = {
  name: "start",
  meaning: "where the first particle starts, or a map of positions to numbers of particles: {1: 3, 2: 2}",
  required: true,
  fallback: null,
};
