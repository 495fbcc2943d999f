import type { KindDocumentation } from "../kind.ts";

export const CHECK_DOCUMENTATION: KindDocumentation = {
  name: "check",
  label: "Check",
  summary: "Whether a comparison holds, told within the errors; marked where it stands unless it holds.",
  keys: [
    {
      name: "that",
      meaning: "a comparison, `K.mean < 0.05`; several may be joined by and, or, not",
      required: true,
      fallback: null,
    },
    { name: "because", meaning: "why it should hold, in words", required: false, fallback: null },
  ],
  ownKeys: false,
  values: [
    { name: "verdict", meaning: "holds, fails, or undecided within the errors" },
    { name: "left", meaning: "the left side of the comparison" },
    { name: "right", meaning: "its right side" },
  ],
  callables: [],
  parts: [],
  shows: [],
  example: "that: K.mean < 0.05\nbecause: So few reach the shore that none is the usual case.",
  offered: {
    name: "bound",
    line: "whether a comparison holds",
    words: "compare inequality less than holds agree",
    body: "that: ‹«number» < «above»›\nbecause: why it should hold",
  },
};
