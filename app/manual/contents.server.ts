import { renderToStaticMarkup } from "react-dom/server";
import {
  type CellResult,
  computePlan,
  KINDS,
  type KindDocumentation,
  PRESENTATION_KEYS,
  planPaper,
  viewCell,
} from "../cells/index.ts";
import { FigurePlate } from "../figures/index.ts";
import { FUNCTIONS } from "../formulas/index.ts";
import { ENVIRONMENTS, NUMBER_ATTRIBUTES, readPaper } from "../paper/index.ts";

/** The manual as plain JSON: all of it from the definitions by which papers are checked. */
export interface ManualContents {
  readonly kinds: readonly KindPages[];
  readonly presentation: readonly Entry[];
  readonly numbers: readonly Entry[];
  readonly surroundings: readonly string[];
  readonly functions: readonly Entry[];
}

/** A word, what it means, and a remark on it. */
export interface Entry {
  readonly term: string;
  readonly meaning: string;
  readonly remark: string;
}

export interface KindPages {
  readonly name: string;
  readonly label: string;
  readonly summary: string;
  readonly ownKeys: boolean;
  readonly keys: readonly Entry[];
  readonly values: readonly Entry[];
  readonly callables: readonly Entry[];
  readonly parts: readonly string[];
  readonly example: string;
  /** The example's figure, computed here; "" where the kind has none or it takes long. */
  readonly plate: string;
}

let made: ManualContents | null = null;

/** Computed at the first call and kept: the definitions do not change while the program runs. */
export function manualContents(): ManualContents {
  made ??= makeContents();
  return made;
}

function makeContents(): ManualContents {
  return {
    kinds: [...KINDS.values()].map(({ documentation }) => kindPages(documentation)),
    presentation: PRESENTATION_KEYS.map(({ name, meaning, fallback, figuresOnly }) => ({
      term: name,
      meaning,
      remark: [figuresOnly ? "figures only" : "", fallback === null ? "" : `otherwise ${fallback}`]
        .filter((part) => part !== "")
        .join("; "),
    })),
    numbers: NUMBER_ATTRIBUTES.map(({ form, meaning }) => ({ term: form, meaning, remark: "" })),
    surroundings: Object.keys(ENVIRONMENTS),
    functions: FUNCTIONS.map(({ form, meaning }) => ({ term: form, meaning, remark: "" })),
  };
}

function kindPages(documentation: KindDocumentation): KindPages {
  const { name, label, summary, ownKeys, keys, values, callables, parts, example } = documentation;
  return {
    name,
    label,
    summary,
    ownKeys,
    keys: keys.map((key) => ({ term: key.name, meaning: key.meaning, remark: remarkOn(key.required, key.fallback) })),
    values: values.map((value) => ({ term: `${SUBJECT}.${value.name}`, meaning: value.meaning, remark: "" })),
    callables: callables.map(({ member, args, least, meaning }) => ({
      term: `${SUBJECT}${member === "" ? "" : `.${member}`}(${args.join(", ")})`,
      meaning,
      remark: least < args.length ? `${args.slice(least).join(", ")} may be left out` : "",
    })),
    parts,
    example: `\`\`\`${name} ${SUBJECT}\n${example}\n\`\`\``,
    plate: plateOf(documentation),
  };
}

function remarkOn(required: boolean, fallback: string | null): string {
  if (required) return "required";
  return fallback === null ? "" : `otherwise ${fallback}`;
}

/** What the examples call the cell they show, and what they may read. */
const SUBJECT = "C";
const AROUND = [
  "```parameters\nmu: 2\nbeta: 1\n```",
  "```process larvae\ndrift: mu\nrate: beta\n```",
  "```counts K\nof: larvae\nstart: 1\n```",
];
const PLATE_WIDTH = 500;

/** The plate of a kind's example, as SVG. */
function plateOf({ name, example, shows }: KindDocumentation): string {
  if (!shows.includes("figure")) return "";
  const text = [...AROUND, `\`\`\`${name} ${SUBJECT}\n${example}\n\`\`\``].join("\n\n");
  const plan = planPaper(readPaper(text, ""));
  const planned = plan.byId.get(SUBJECT);
  if (planned === undefined || !planned.quick) return "";
  const results = new Map<string, CellResult>();
  for (const [id, outcome] of computePlan(plan)) if (outcome.status === "computed") results.set(id, outcome.result);
  const result = results.get(SUBJECT);
  const figure = result && viewCell(planned, result, plan, results).figure;
  return figure ? renderToStaticMarkup(FigurePlate({ figure, width: PLATE_WIDTH })) : "";
}
