import type { Formula, Value } from "../../formulas/index.ts";
import type { FixedPoint, Orbit, PlaneWindow } from "../../solvers/index.ts";
import { profileConstants, SOLVER_VERSIONS } from "../../solvers/index.ts";
import type { Body, CellReference } from "../body.ts";
import type { KindOf } from "../kind.ts";
import { documentedMembers } from "../kind.ts";
import { diffusionWords, trajectoryOf } from "../process/model.ts";
import { estimateValue, refusedValue } from "../values.ts";
import { PORTRAIT_DOCUMENTATION } from "./documentation.ts";
import { frontOf, frontPortrait } from "./front.ts";
import { processPortrait } from "./process.ts";
import { viewPortrait } from "./view.ts";

export interface FrontModel {
  readonly reaction: Formula;
  readonly speed: Formula;
  readonly diffusion: Formula;
}

export type PortraitCell = { readonly of: CellReference } | { readonly front: FrontModel };

/** What is drawn, in numbers. */
export interface PortraitData {
  /** w of a process, u of a front. */
  readonly variable: "w" | "u";
  readonly window: PlaneWindow;
  readonly fixedPoints: readonly FixedPoint[];
  /** The curves that the portrait is about, x increasing along each. */
  readonly trajectory: readonly Orbit[];
  /** Others of the same plane. */
  readonly orbits: readonly Orbit[];
  /** Where the trajectory leaves w = 0, and where it turns; null where there is no such place. */
  readonly slopeAtBarrier: number | null;
  readonly s0: number | null;
  readonly remarks: readonly string[];
}

export const PORTRAIT: KindOf<PortraitCell, PortraitData> = {
  documentation: PORTRAIT_DOCUMENTATION,
  solver: `plane ${SOLVER_VERSIONS.plane}`,
  knownAtPlanning: false,

  read(body: Body): PortraitCell {
    const isFront = body.has("reaction");
    checkAlternatives(body);
    return isFront ? { front: readFront(body) } : { of: body.reference("of", ["process"]) };
  },

  members: () => documentedMembers(PORTRAIT_DOCUMENTATION),

  inspect(model, context) {
    if ("front" in model) frontOf(model.front, context);
    return "of" in model;
  },

  compute(model, context) {
    if ("front" in model) {
      const { data, words } = frontPortrait(model.front, context);
      const none = refusedValue("A front has no barrier: this is a value of a portrait of a process.");
      return { values: { slope_at_barrier: none, s0: none }, data, method: words };
    }
    const trajectory = trajectoryOf(model.of, context);
    const constants = profileConstants(trajectory);
    const values: Record<string, Value> = {
      slope_at_barrier: estimateValue(constants.slopeAtBarrier),
      s0: estimateValue(constants.s0),
    };
    const method = `Slopes of the trajectory, other orbits by Dormand and Prince's method; ${diffusionWords(trajectory.model)}`;
    return { values, data: processPortrait(trajectory), method };
  },

  call: () => undefined,
  view: viewPortrait,
};

function checkAlternatives(body: Body): void {
  const [of, reaction, speed] = [body.node("of"), body.node("reaction"), body.node("speed")];
  if (of === null && reaction === null)
    body.problem(
      body.opening,
      "A portrait cell needs `of`, a process, or `reaction` and `speed` of a front: `reaction: u*(1 - u)`, `speed: 2`.",
    );
  if (of !== null && reaction !== null)
    body.problem(reaction, "A portrait is of a process or of a front: `of` and `reaction` do not stand together.");
  if (reaction !== null && speed === null)
    body.problem(body.opening, "`speed` is missing: a portrait of a front needs it beside its `reaction`.");
  for (const key of ["speed", "diffusion"]) {
    const node = body.node(key);
    if (node !== null && reaction === null)
      body.problem(node, `\`${key}\` belongs to a \`reaction\`; a process has its own.`);
  }
}

function readFront(body: Body): FrontModel {
  const node = body.node("reaction");
  const reaction = body.formula("reaction", "0", ["u"]);
  if (node !== null) body.introduceWord("u", node, "reaction");
  return { reaction, speed: body.formula("speed", "0"), diffusion: body.formula("diffusion", "1") };
}
