import type { ReferenceEntry } from "../solvers/reference.ts";
import { cell } from "./papers.ts";

/** The process of a reference entry as a paper writes it, under the name `larvae`. */
export function referenceProcess({ model }: Pick<ReferenceEntry, "model">): string {
  const { offspring } = model;
  const law =
    offspring.law === "finite"
      ? `{${offspring.probabilities.map((p, k) => `${k}: ${p}`).join(", ")}}`
      : `{law: ${offspring.law}, mean: ${offspring.mean}}`;
  const lines = [`drift: ${model.drift}`, `rate: ${model.rate}`, `diffusion: ${model.diffusion}`, `offspring: ${law}`];
  return cell("process larvae", ...lines);
}
