/** The half-line solver: one trajectory, from which every answer is read. */

export type { ProbabilityInterval } from "./binomial-interval.ts";
export { clopperPearson, INTERVAL_ACCURACY } from "./binomial-interval.ts";
export { absorbedAbove, absorbedLaw, absorbedProbability } from "./counts.ts";
export { SolverError } from "./errors.ts";
export { absorbedMoments, factorialMoment } from "./moments.ts";
export type { OrbitPoint, PlaneWindow } from "./orbit.ts";
export { traceOrbit } from "./orbit.ts";
export type { FixedPoint, Plane } from "./phase-plane.ts";
export { fixedPoint, processPlane } from "./phase-plane.ts";
export type { Orbit } from "./portrait.ts";
export { portraitOrbits, saddleOrbits } from "./portrait.ts";
export { describeProcess } from "./process.ts";
export { profileAt, profileComplementAt, profileConstants, profileSlopeAt } from "./profile.ts";
export type { NoRoot, Root } from "./root.ts";
export { findRoot } from "./root.ts";
export type { Probe, Sample } from "./root-bracket.ts";
export type { SimulatedCounts, SimulationPlan, SimulationWishes } from "./simulation.ts";
export { CHUNK, mergeCounts, planSimulation, simulateChunks } from "./simulation.ts";
export { survivalProbability } from "./survival.ts";
export { tailLaw, tailProbability } from "./tail.ts";
export { solveTrajectory } from "./trajectory.ts";
export type {
  AbsorbedLaw,
  Answer,
  Estimate,
  Offspring,
  Pair,
  ProcessModel,
  Refusal,
  Regime,
  ScaledEstimate,
  Start,
  Starts,
  TailLaw,
  Trajectory,
} from "./types.ts";
export { SOLVER_VERSIONS } from "./versions.ts";
export { zerosOf } from "./zeros.ts";
