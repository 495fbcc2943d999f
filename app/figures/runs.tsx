import type { ReactNode } from "react";
import type { LabelRun } from "./label.ts";
import { SHIFTED_SCALE, VARIABLE_SCALE } from "./measure.ts";
import type { Theme } from "./palette.ts";

const VARIABLE_FACE = "KaTeX_Math, Lora, Georgia, serif";
const BLACKBOARD_FACE = "KaTeX_AMS, serif";
/** KaTeX's double-struck capitals stand at the plain letters' places; a file, read where KaTeX is not, has Unicode's own. */
const BLACKBOARD_LETTERS = new Map([..."ℂC𝔼EℍHℕNℙPℚQℝRℤZ"].map((c, i, all) => [c, all[i + 1] ?? c]));

/** A label's runs as tspans; a raised or lowered run gives back its shift to the next. */
export function Runs({
  runs,
  fontSize,
  theme,
}: {
  readonly runs: readonly LabelRun[];
  readonly fontSize: number;
  readonly theme: Theme;
}) {
  const shiftOf = (run: LabelRun) =>
    run.shift === "sub" ? fontSize * 0.24 : run.shift === "sup" ? -fontSize * 0.36 : 0;
  const spans: ReactNode[] = [];
  let height = 0;
  let place = 0;
  for (const run of runs) {
    const variable = run.style === "variable";
    const doubled = run.style === "blackboard" && theme === "page";
    const size = fontSize * (variable ? VARIABLE_SCALE : 1) * (run.shift === "base" ? 1 : SHIFTED_SCALE);
    const shift = shiftOf(run);
    spans.push(
      <tspan
        key={place}
        dy={shift === height ? undefined : (shift - height).toFixed(2)}
        fontSize={size === fontSize ? undefined : size.toFixed(2)}
        fontFamily={variable ? VARIABLE_FACE : doubled ? BLACKBOARD_FACE : undefined}
        fontStyle={variable ? "italic" : undefined}
      >
        {doubled ? [...run.text].map((c) => BLACKBOARD_LETTERS.get(c) ?? c).join("") : run.text}
      </tspan>,
    );
    height = shift;
    place += 1;
  }
  return <>{spans}</>;
}
