/**
 * Times what a reader waits for, as ratios within one run so that they do not depend on the machine:
 * npm run bench [-- solvers] [simulation] [papers] [keystroke]; without a subject, all of them.
 */

/** Makes this file a module, so that it may wait. */
export interface Subject {
  readonly print: () => Promise<void>;
}

/** Each subject has a file of its own, loaded when it is asked for. */
const SUBJECTS: Readonly<Record<string, () => Promise<Subject>>> = {
  solvers: async () => ({ print: (await import("./solvers.ts")).printSolvers }),
  simulation: async () => ({ print: (await import("./simulation.ts")).printSimulation }),
  papers: async () => ({ print: (await import("./papers.ts")).printPapers }),
  keystroke: async () => {
    const [{ printKeystrokes }, { longPaper }] = await Promise.all([import("./keystroke.ts"), import("./papers.ts")]);
    return { print: () => printKeystrokes(longPaper()) };
  },
  opening: async () => {
    const [{ printOpening }, { longPaper }] = await Promise.all([import("./opening.ts"), import("./papers.ts")]);
    return { print: () => printOpening(longPaper()) };
  },
};

const wanted = process.argv.slice(2);
const unknown = wanted.find((name) => !Object.hasOwn(SUBJECTS, name));
if (unknown !== undefined)
  throw new Error(`There is no subject "${unknown}". The subjects are ${Object.keys(SUBJECTS).join(", ")}.`);
for (const [name, load] of Object.entries(SUBJECTS))
  if (wanted.length === 0 || wanted.includes(name)) await (await load()).print();
