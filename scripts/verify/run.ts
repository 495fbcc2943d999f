/**
 * Measures whether errors hold: random models of all laws and regimes, random questions, each answer against a reference in
 * many digits. npm run verify -- [--count 400] [--seed 1] [--up-to 150] [--kind between] [--show 20]
 */
import { parseArgs } from "node:util";
import { KINDS, type Kind } from "./exact-model.ts";
import { type Outcome, survey } from "./survey.ts";

/** What is asked for. */
const SHARE = 0.999;
const WIDTH = 1000;

const { values } = parseArgs({
  options: {
    count: { type: "string", default: "400" },
    seed: { type: "string", default: "1" },
    "up-to": { type: "string", default: "150" },
    kind: { type: "string", multiple: true },
    show: { type: "string", default: "20" },
  },
});
const kinds = (values.kind ?? KINDS) as readonly Kind[];
const unknown = kinds.find((kind) => !KINDS.includes(kind));
if (unknown !== undefined) throw new Error(`There is no kind "${unknown}". The kinds are ${KINDS.join(", ")}.`);

const outcomes = [
  ...survey({ count: Number(values.count), seed: Number(values.seed), upTo: Number(values["up-to"]), kinds }),
];
const judged = outcomes.filter((o) => o.verdict !== null);
const broken = judged.filter((o) => !o.verdict?.holds);

table("kind", (o) => o.kind);
table("subject", (o) => o.subject);
for (const o of broken.slice(0, Number(values.show)))
  console.log(
    `Does not hold: ${o.subject} (${o.detail}), ${o.kind}, by ${o.verdict?.used.toPrecision(3)}: ${describe(o)}`,
  );

const share = 1 - broken.length / judged.length;
const width = quantile(judged, (o) => o.verdict?.width ?? 0, 0.5);
const failed = outcomes.filter((o) => o.failed !== undefined);
for (const [message, cases] of grouped(failed, (o) => o.failed ?? ""))
  console.log(`Not vouched for, ${cases.length} times: ${message}\n    as for ${describe(cases[0] as Outcome)}`);
console.log(
  `\n${judged.length} numbers about ${values.count} models, seed ${values.seed}: the error holds for ${(100 * share).toFixed(3)} % (asked: ${100 * SHARE} %); half of the bounds are within ${width.toFixed(1)} of the larger of true error and spacing (asked: ${WIDTH}), and ${(100 * within(judged)).toFixed(1)} % within ${WIDTH}; the worst true error is ${quantile(judged, (o) => o.verdict?.used ?? 0, 1).toPrecision(3)} of its bound.`,
);
process.exitCode = share >= SHARE && width <= WIDTH && judged.length > 0 ? 0 : 1;

function table(heading: string, of: (o: Outcome) => string): void {
  console.log(
    `\n${heading.padEnd(30)} judged  refused  failed   holds %  bound/true: median  ≤ ${WIDTH} %   bound relative: median    95 %     worst use`,
  );
  for (const [name, cases] of grouped(outcomes, of)) {
    const own = cases.filter((o) => o.verdict !== null);
    const held = own.filter((o) => o.verdict?.holds).length;
    const relative = (share: number) => quantile(own, (o) => o.verdict?.relative ?? 0, share).toExponential(1);
    const columns = [
      String(own.length).padStart(6),
      String(cases.filter((o) => o.refused !== undefined).length).padStart(8),
      String(cases.filter((o) => o.failed !== undefined).length).padStart(7),
      own.length === 0 ? "" : ((100 * held) / own.length).toFixed(3).padStart(9),
      quantile(own, (o) => o.verdict?.width ?? 0, 0.5)
        .toFixed(1)
        .padStart(19),
      (100 * within(own)).toFixed(1).padStart(9),
      relative(0.5).padStart(24),
      relative(0.95).padStart(9),
      quantile(own, (o) => o.verdict?.used ?? 0, 1)
        .toPrecision(3)
        .padStart(12),
    ];
    console.log(`${name.padEnd(30)} ${columns.join(" ")}`);
  }
}

function within(cases: readonly Outcome[]): number {
  return cases.filter((o) => (o.verdict?.width ?? 0) <= WIDTH).length / Math.max(1, cases.length);
}

function quantile(cases: readonly Outcome[], of: (o: Outcome) => number, share: number): number {
  const sorted = cases.map(of).sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] ?? Number.NaN;
}

function grouped(cases: readonly Outcome[], of: (o: Outcome) => string): Map<string, Outcome[]> {
  const groups = new Map<string, Outcome[]>();
  for (const o of cases) groups.set(of(o), [...(groups.get(of(o)) ?? []), o]);
  return groups;
}

function describe({ exact, detail }: Outcome): string {
  const { drift, rate, diffusion, offspring } = exact.model;
  const law =
    offspring.law === "finite" ? `[${offspring.probabilities.join(", ")}]` : `${offspring.law} ${offspring.mean}`;
  return `drift ${drift}, rate ${rate}, diffusion ${diffusion}, offspring ${law}${detail === "" ? "" : `, ${detail}`}`;
}
