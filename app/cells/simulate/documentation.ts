import type { KindDocumentation } from "../kind.ts";
import { OF_A_PROCESS, START } from "../process/reading.ts";

export const SIMULATE_DOCUMENTATION: KindDocumentation = {
  name: "simulate",
  label: "Simulation",
  summary:
    "K by simulation, exact in law without a step of time: a check of the computed law that shares nothing with it.",
  keys: [
    OF_A_PROCESS,
    START,
    { name: "replicates", meaning: "how many, from 2", required: false, fallback: "100000" },
    { name: "seed", meaning: "a whole number; equal seeds give equal results", required: false, fallback: "1" },
    { name: "confidence", meaning: "of the intervals, each by itself", required: false, fallback: "0.95" },
    {
      name: "cut",
      meaning:
        "particles that branch above it are dropped; chosen: where that changes the mean by less than 1 % of its standard error",
      required: false,
      fallback: "chosen",
    },
    {
      name: "cap",
      meaning: "a replicate ends when K reaches it; 1000 where K may be infinite, otherwise none",
      required: false,
      fallback: null,
    },
  ],
  ownKeys: false,
  values: [
    { name: "mean", meaning: "estimate of E K; where K may be infinite, of E K given K below the cap" },
    { name: "zero", meaning: "estimate of P(K = 0)" },
    { name: "variance", meaning: "estimate of Var K; where K may be infinite, of that given K below the cap" },
    { name: "replicates", meaning: "how many replicates" },
    { name: "bias", meaning: "bound on what the cut changes in the mean and in each probability" },
    { name: "cut", meaning: "where particles were dropped" },
  ],
  callables: [
    { member: "", args: ["n"], least: 1, meaning: "estimate of P(K = n)" },
    { member: "low", args: ["n"], least: 1, meaning: "lower end of the interval for P(K = n)" },
    { member: "high", args: ["n"], least: 1, meaning: "upper end of the interval for P(K = n)" },
    { member: "hits", args: ["n"], least: 1, meaning: "how many replicates had K = n" },
  ],
  parts: ["figure", "table", "points"],
  shows: ["figure"],
  example: "of: larvae\nstart: 1\nreplicates: 20000",
  offered: {
    name: "S",
    line: "families drawn by chance",
    words: "simulate chance random draw replicates drawn",
    body: "of: «process»\nstart: ‹«start»›\nreplicates: 20000\ncaption: The law of $K$ by simulation.",
  },
};
