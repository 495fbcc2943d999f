import { type CellResult, computePlan, planPaper, type ShownCell } from "../../app/cells/index.ts";
import type { ToWorker } from "../../app/editor/model/messages.ts";
import { readPaper } from "../../app/paper/index.ts";

/** A small paper with everything that the sheet typesets. */
export const SAMPLE = `---
title: How many reach $x$?
authors:
  - name: Inês Valadão
macros:
  \\E: \\mathbb{E}
---

\`\`\`parameters
mu: {value: 1.6, min: 1.45, max: 4, step: 0.05, symbol: \\mu, note: drift}
beta: 1
\`\`\`

## Model {#model}

The mean is $\\E[K]$
and *decays* at :value[larvae.decay]{digits=8}, see :ref[kpp] and :ref[K].

$$w'' + \\mu w' = \\value{mu} \\label{kpp}$$

:::theorem[Shift]{#shift}
It holds, by :cite[kesten1978].
:::

\`\`\`process larvae
drift: mu
rate: beta
\`\`\`

\`\`\`counts K
of: larvae
start: 1
up_to: 6
caption: The law of $K$.
\`\`\`

- An item with **strong** words.
`;

export const BIBTEX = `@article{kesten1978, author = {Kesten, Harry}, title = {Branching}, journal = {SPA}, year = {1978}}`;

export function tellText(text: string, version = 1): ToWorker {
  return { tell: "text", version, text, bibliography: BIBTEX };
}

/** What a server would show after computing all of a text, and the results. */
export function computed(text: string): { shown: ToWorker; results: CellResult[]; cells: Record<string, ShownCell> } {
  const plan = planPaper(readPaper(text, BIBTEX));
  const results: CellResult[] = [];
  const cells: Record<string, ShownCell> = {};
  for (const [id, outcome] of computePlan(plan)) {
    const planned = plan.byId.get(id);
    if (outcome.status !== "computed" || planned === undefined) continue;
    results.push(outcome.result);
    cells[planned.slot] = {
      key: outcome.result.key,
      at: new Date().toISOString(),
      by: "Inês",
      seconds: outcome.result.seconds,
      solver: outcome.result.solver,
      parameterValues: planned.parameterValues,
      workingKey: planned.workingKey ?? "",
    };
  }
  return { shown: { tell: "shown", cells, work: {}, changes: {} }, results, cells };
}
