import { parameterWords } from "./parameter-values.ts";
import { KINDS } from "./registry.ts";
import type { Cause, Plan, PlannedCell, ShownCell, ShownPaper } from "./types.ts";

/** Why a shown result is not that of the text as it stands. Empty when it is, or when nothing is shown. */
export function causesOf(
  planned: PlannedCell,
  shown: ShownCell | undefined,
  plan: Plan,
  shownPaper: ShownPaper,
): readonly Cause[] {
  if (shown === undefined || shown.key === planned.key) return [];
  const causes = [
    ...parameterCauses(shown, plan, shownPaper),
    ...workingCauses(planned, shown, plan, shownPaper),
    ...solverCauses(planned, shown),
  ];
  // A key differs for some reason: if none was found, something that it reads is no longer what it was.
  if (causes.length > 0) return causes;
  const [need] = planned.needs;
  return [need === undefined ? { cause: "working" } : { cause: "needs", id: need }];
}

/**
 * A cause in words, as a sentence's part without its full stop: "Set with μ = 1.90; μ is now 2.00 (Tormod, 14:30)".
 * `symbol` turns a parameter's TeX into what can be shown; `time` an ISO time into the reader's own.
 */
export function causeWords(cause: Cause, show: { symbol(tex: string): string; time(iso: string): string }): string {
  switch (cause.cause) {
    case "parameter": {
      const symbol = show.symbol(cause.symbol);
      const who = [cause.by, cause.at === null ? null : show.time(cause.at)].filter((part) => part !== null).join(", ");
      return `Set with ${symbol} = ${cause.was}; ${symbol} is now ${cause.now}${who === "" ? "" : ` (${who})`}`;
    }
    case "working":
      return "Its working was changed";
    case "solver":
      return `The solver is newer (${cause.was} → ${cause.now})`;
    case "needs":
      return `The working of \`${cause.id}\`, which it reads, was changed`;
  }
}

/** Parameters whose values differ from those it was set with. One computed from another that differs is left to the other. */
function parameterCauses(shown: ShownCell, plan: Plan, shownPaper: ShownPaper): Cause[] {
  return plan.parameters.flatMap((parameter): Cause[] => {
    const was = Object.hasOwn(shown.parameterValues, parameter.name)
      ? shown.parameterValues[parameter.name]
      : undefined;
    const now = parameterWords(parameter);
    if (was === undefined || sameNumber(was, now)) return [];
    const change = shownPaper.changes.get(parameter.name);
    const { name, symbol } = parameter;
    return [{ cause: "parameter", name, symbol, was, now, by: change?.by ?? null, at: change?.at ?? null }];
  });
}

/** "1.9" and "1.90" are one number typed in two ways. */
function sameNumber(a: string, b: string): boolean {
  return a === b || (a.trim() !== "" && Number(a) === Number(b));
}

function workingCauses(planned: PlannedCell, shown: ShownCell, plan: Plan, shownPaper: ShownPaper): Cause[] {
  const [own, whole] = (planned.workingKey ?? "").split(".");
  const [ownShown, wholeShown] = shown.workingKey.split(".");
  if (own !== ownShown) return [{ cause: "working" }];
  if (whole === wholeShown) return [];
  const changed = planned.needs.filter((id) => needChanged(plan.byId.get(id), shownPaper));
  const blamed = changed.length > 0 ? changed : planned.needs.slice(0, 1);
  return blamed.map((id): Cause => ({ cause: "needs", id }));
}

function needChanged(need: PlannedCell | undefined, shownPaper: ShownPaper): boolean {
  const shown = need === undefined ? undefined : shownPaper.cells.get(need.slot);
  return need !== undefined && shown !== undefined && shown.workingKey !== need.workingKey;
}

function solverCauses(planned: PlannedCell, shown: ShownCell): Cause[] {
  const now = KINDS.get(planned.kind)?.solver ?? shown.solver;
  if (now === shown.solver) return [];
  const version = (solver: string): string => solver.slice(solver.lastIndexOf(" ") + 1);
  return [{ cause: "solver", was: version(shown.solver), now: version(now) }];
}
