import type { AxesSaid, AxisSaid } from "../../cells/index.ts";
import { axisEnds, type Figure } from "../../figures/index.ts";
import type { AxisTried } from "./types.ts";

export type AxisName = "x" | "y";

/** What stands in the fields of one axis. An empty end is the computed one. */
export interface AxisFields {
  readonly from: string;
  readonly to: string;
  readonly scale: "linear" | "log";
}

export type AxesFields = Readonly<Record<AxisName, AxisFields>>;

/** A fault is said at its field. */
export type FieldName = `${AxisName} ${keyof AxisFields}`;

export interface AxesAsked {
  /** As the fields have it, to be looked at; of an axis at fault, as it was. */
  readonly tried: Readonly<Record<AxisName, AxisTried>>;
  /** To be written; null while a field is at fault. */
  readonly said: AxesSaid | null;
  readonly faults: ReadonlyMap<FieldName, string>;
}

/** The axes of a figure as they are, and what the paper says of them. */
export interface AxesGround {
  readonly figure: Figure;
  readonly said: AxesSaid;
  /** The number that an end is written as; null: none. */
  readonly numberOf: (source: string) => number | null;
}

/** The fields as they first stand: what the paper says. */
export function fieldsOf({ figure, said }: AxesGround): AxesFields {
  const of = (axis: AxisName): AxisFields => ({
    from: said[axis].range?.[0] ?? "",
    to: said[axis].range?.[1] ?? "",
    scale: figure[axis].scale,
  });
  return { x: of("x"), y: of("y") };
}

/** The ends that axes on these scales have without being told; "" where a number cannot say them. */
export function computedEnds(
  { figure }: AxesGround,
  scales: Readonly<Record<AxisName, "linear" | "log">>,
): Readonly<Record<AxisName, readonly [string, string]>> {
  const untold = (axis: AxisName) => ({ ...figure[axis], scale: scales[axis], range: untoldRange(figure[axis]) });
  const ends = axisEnds({ ...figure, x: untold("x"), y: untold("y") });
  const words = (axis: AxisName) => [String(ends[axis]?.[0] ?? ""), String(ends[axis]?.[1] ?? "")] as const;
  return { x: words("x"), y: words("y") };
}

/** What is asked for by the fields: to be looked at, to be written, and what is at fault. */
export function askedOf(ground: AxesGround, fields: AxesFields): AxesAsked {
  const computed = computedEnds(ground, { x: fields.x.scale, y: fields.y.scale });
  const faults = new Map<FieldName, string>();
  const asked = (axis: AxisName) => askedOfAxis(axis, ground, fields[axis], computed[axis], faults);
  const [x, y] = [asked("x"), asked("y")];
  return { tried: { x: x.tried, y: y.tried }, said: faults.size > 0 ? null : { x: x.said, y: y.said }, faults };
}

function askedOfAxis(
  axis: AxisName,
  { figure, said, numberOf }: AxesGround,
  fields: AxisFields,
  computed: readonly [string, string],
  faults: Map<FieldName, string>,
): { readonly tried: AxisTried; readonly said: AxisSaid } {
  const own = figure[axis];
  const kindScale = own.otherwise?.scale ?? own.scale;
  const written = said[axis].scale;
  // What the kind does anyway need not be said; what the author says all the same stays.
  const scale = fields.scale === kindScale && fields.scale !== written ? null : fields.scale;
  const fault = (field: keyof AxisFields, words: string) => {
    faults.set(`${axis} ${field}`, words);
    return { tried: { range: own.range, scale: own.scale }, said: said[axis] };
  };
  if (fields.scale === "log" && !hasPositive(figure, axis))
    return fault("scale", "Nothing of the figure lies above 0, where a logarithmic axis could show it.");
  const [from, to] = [fields.from.trim(), fields.to.trim()];
  if (from === "" && to === "")
    return { tried: { range: untoldRange(own), scale: fields.scale }, said: { range: null, scale } };
  const texts = [from || computed[0], to || computed[1]] as const;
  const [low, high] = [numberOf(texts[0]), numberOf(texts[1])];
  if (low === null) return fault("from", notANumber(from));
  if (high === null) return fault("to", notANumber(to));
  if (fields.scale === "log" && low <= 0)
    return fault("from", `A logarithmic axis begins above 0, and ${from} is not; choose linear, or a positive end.`);
  if (low >= high) {
    const [field, words] =
      to === "" ? (["from", `below ${texts[1]}`] as const) : (["to", `above ${texts[0]}`] as const);
    return fault(field, `An axis goes upwards: this end has to be ${words}.`);
  }
  return { tried: { range: [low, high], scale: fields.scale }, said: { range: texts, scale } };
}

function notANumber(text: string): string {
  if (text === "") return "This end cannot be computed as a number: write it.";
  return `${text} is no number: write one, as 0.5, or a formula in the paper's parameters.`;
}

const untoldRange = (axis: Figure["x"]): AxisTried["range"] => (axis.otherwise ?? axis).range;

/** Whether a logarithmic axis would show anything of a figure. */
function hasPositive({ series, levels, verticals = [] }: Figure, axis: AxisName): boolean {
  const above = (value: number | null | undefined) => typeof value === "number" && value > 0;
  if (axis === "x") return series.some(({ x }) => x.some(above)) || verticals.some(({ x }) => above(x));
  const shown = series.some(
    ({ y, high, log10y }) => y.some(above) || high?.some(above) || log10y?.some((log) => typeof log === "number"),
  );
  return shown || levels.some(({ y }) => above(y));
}
