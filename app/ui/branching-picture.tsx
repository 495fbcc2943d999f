import { ancestryOfAbsorbed, type BranchingModel, type Lineage, simulateBranching } from "./branching-path.ts";

/** Drift above the critical sqrt(2): only finitely many ever reach the shore. */
const LARVA: BranchingModel = { start: 0.9, drift: 1.45, rate: 1, diffusion: 0.5, until: 3.2, step: 0.0125 };
/** One of a few hundred thousand realizations: rarely do as many as four arrive. */
const REALIZATION = 174_708;

const WIDTH = 840;
const HEIGHT = 1000;
const TOP = 72;
/** Pixels a unit of length, and a unit of time. */
const ACROSS = 104;
const DOWN = (HEIGHT - TOP) / LARVA.until;

const lineages = simulateBranching(LARVA, REALIZATION);
const inked = ancestryOfAbsorbed(lineages);
const arrivals = lineages
  .filter((lineage) => lineage.absorbed)
  .map((lineage) => toY(lineage.times.at(-1) ?? 0))
  .sort((a, b) => a - b);

const COUNTED = ["None", "One", "Two", "Three", "Four", "Five", "Six"];
/** What the picture shows, counted from it. */
export const BRANCHING_CAPTION = `One simulated larva. ${COUNTED[arrivals.length] ?? arrivals.length} of its lineages reach the shore.`;

/** The picture of the first page. The shore is its left edge; time runs down. */
export function BranchingPicture({ className = "" }: { readonly className?: string }) {
  return (
    <svg
      className={className}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      preserveAspectRatio="xMinYMin slice"
      role="img"
      aria-label={BRANCHING_CAPTION}
    >
      <g fill="none" strokeLinejoin="round" stroke="var(--edge)" strokeWidth="0.9" opacity="0.75">
        <path d={paths(false)} />
      </g>
      <path d={paths(true)} fill="none" stroke="var(--ink)" strokeWidth="1.5" strokeLinejoin="round" />
      <path d={`M0 0V${HEIGHT}`} stroke="var(--ink)" strokeWidth="2.5" />
      {arrivals.map((y, index) => (
        <g key={y}>
          <circle cx="0" cy={y} r="6" fill="var(--paper)" stroke="var(--ink)" strokeWidth="2" />
          <text x="-16" y={y + 5} textAnchor="end" className="fill-ink font-text italic text-[15px]">
            {index + 1}
          </text>
        </g>
      ))}
      <circle cx={toX(LARVA.start)} cy={TOP} r="4.5" fill="var(--ink)" />
      <text x={toX(LARVA.start) - 8} y={TOP - 14} className="fill-ink font-text italic text-[18px]">
        x
        <tspan dy="4" className="not-italic text-[12px]">
          0
        </tspan>
      </text>
    </svg>
  );
}

function paths(ofAbsorbed: boolean): string {
  return lineages
    .filter((_, index) => inked.has(index) === ofAbsorbed)
    .map(pathOf)
    .join("");
}

function pathOf({ times, positions }: Lineage): string {
  const points = positions.map((position, index) => `${toX(position)} ${toY(times[index] ?? 0)}`);
  return `M${points.join("L")}`;
}

function toX(position: number): number {
  return Math.round(position * ACROSS * 10) / 10;
}

function toY(time: number): number {
  return Math.round((TOP + time * DOWN) * 10) / 10;
}
