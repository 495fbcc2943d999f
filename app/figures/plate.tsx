import type { ReactNode } from "react";
import type { LabelRun } from "./label.ts";
import type { PlacedLabel } from "./labels.ts";
import { type FigureLayout, layoutFigure } from "./layout.ts";
import { TICK_LENGTH } from "./layout-axes.ts";
import { ORDINARY_WIDTH, type PlacedSeries, PRINCIPAL_WIDTH } from "./layout-series.ts";
import { SHIFTED_SCALE, VARIABLE_SCALE } from "./measure.ts";
import { PALETTES, type Palette, type Theme } from "./palette.ts";
import type { Figure } from "./types.ts";

export interface FigurePlateProps {
  readonly figure: Figure;
  /** CSS pixels; 500 when left out. The plate never grows beyond its container. */
  readonly width?: number;
  readonly height?: number;
  /** `page` takes the design's custom properties; `light`, `dark` and `print` stand alone, for files. */
  readonly theme?: Theme;
  readonly className?: string;
}

const TEXT_FACE = "var(--ui, Commissioner, system-ui, sans-serif)";
const VARIABLE_FACE = "KaTeX_Math, Lora, Georgia, serif";
const BLACKBOARD_FACE = "KaTeX_AMS, serif";
/** KaTeX's double-struck capitals stand at the plain letters' places. */
const BLACKBOARD_LETTERS = new Map([..."ℂC𝔼EℍHℕNℙPℚQℝRℤZ"].map((c, i, all) => [c, all[i + 1] ?? c]));
const FILE_FACE = "Commissioner, Helvetica, Arial, sans-serif";

/** One plate as SVG: axis lines only under the data, direct labels, no legend, no box, no grid. Says its finding to a screen reader. */
export function FigurePlate({ figure, width = 500, height, theme = "page", className }: FigurePlateProps) {
  const layout = layoutFigure(figure, { width, height, fontSize: width > 800 ? 14 : 12.5 });
  const palette = PALETTES[theme];
  return (
    <svg
      xmlns="http://www.w3.org/2000/svg"
      viewBox={`0 0 ${layout.width} ${layout.height}`}
      width={layout.width}
      height={layout.height}
      role="img"
      aria-label={figure.alternative}
      className={className}
      style={{ maxWidth: "100%", height: "auto", display: "block", fontVariantNumeric: "lining-nums tabular-nums" }}
      fontFamily={theme === "page" ? TEXT_FACE : FILE_FACE}
      fontSize={layout.fontSize}
    >
      <title>{figure.alternative}</title>
      <Axes layout={layout} palette={palette} />
      {layout.series.map((series) => (
        <Band key={series.name} series={series} palette={palette} />
      ))}
      {[...layout.series].sort(principalLast).map((series) => (
        <Curve key={series.name} series={series} palette={palette} unit={layout.fontSize / 12.5} />
      ))}
      {layout.labels.map((label) => (
        <CurveLabel key={`${label.tex} ${label.y}`} label={label} palette={palette} fontSize={layout.fontSize} />
      ))}
    </svg>
  );
}

const principalLast = (a: PlacedSeries, b: PlacedSeries) => Number(a.principal) - Number(b.principal);

function Axes({ layout, palette }: { readonly layout: FigureLayout; readonly palette: Palette }) {
  const { frame, fontSize } = layout;
  return (
    <g fill={palette.quiet}>
      <path
        d={`M${frame.left} ${frame.bottom}H${frame.right}${layout.xTicks.map((tick) => `M${tick.position.toFixed(2)} ${frame.bottom}v${TICK_LENGTH}`).join("")}`}
        fill="none"
        stroke={palette.quiet}
      />
      {layout.xTicks.map((tick) =>
        tick.shown ? (
          <text
            key={tick.at}
            x={tick.position.toFixed(2)}
            y={frame.bottom + TICK_LENGTH + fontSize}
            textAnchor="middle"
          >
            <Runs runs={tick.runs} fontSize={fontSize} />
          </text>
        ) : null,
      )}
      {layout.yTicks.map((tick) => (
        <text
          key={tick.at}
          x={layout.tickEnd.toFixed(2)}
          y={(tick.position + fontSize * 0.36).toFixed(2)}
          textAnchor="end"
        >
          <Runs runs={tick.runs} fontSize={fontSize} />
        </text>
      ))}
      {layout.levels.map((level) => (
        <g key={level.y}>
          <path
            d={`M${frame.left} ${level.y.toFixed(2)}H${frame.right}`}
            fill="none"
            stroke={palette.edge}
            strokeDasharray="1 3"
            strokeLinecap="round"
          />
          {level.start ? <circle cx={frame.left} cy={level.y.toFixed(2)} r={2.6} fill={palette.edge} /> : null}
        </g>
      ))}
      <AxisLabel label={layout.xLabel} palette={palette} fontSize={fontSize} />
      <AxisLabel label={layout.yLabel} palette={palette} fontSize={fontSize} />
    </g>
  );
}

function AxisLabel({
  label,
  palette,
  fontSize,
}: {
  readonly label: PlacedLabel | null;
  readonly palette: Palette;
  readonly fontSize: number;
}) {
  if (!label) return null;
  return (
    <text x={label.x.toFixed(2)} y={label.y.toFixed(2)} textAnchor={label.anchor} fill={palette.ink}>
      <Runs runs={label.runs} fontSize={fontSize} />
    </text>
  );
}

function CurveLabel({
  label,
  palette,
  fontSize,
}: {
  readonly label: PlacedLabel;
  readonly palette: Palette;
  readonly fontSize: number;
}) {
  const colour = label.colour === "quiet" ? palette.quiet : palette.series[label.colour];
  return (
    <g>
      {label.leader ? <path d={label.leader} fill="none" stroke={colour} strokeWidth={0.8} /> : null}
      <text x={label.x.toFixed(2)} y={(label.y + fontSize * 0.36).toFixed(2)} textAnchor={label.anchor} fill={colour}>
        <Runs runs={label.runs} fontSize={fontSize} />
      </text>
    </g>
  );
}

function Band({ series, palette }: { readonly series: PlacedSeries; readonly palette: Palette }) {
  return series.band === "" ? null : <path d={series.band} fill={palette.series[series.colour]} fillOpacity={0.16} />;
}

function Curve({
  series,
  palette,
  unit,
}: {
  readonly series: PlacedSeries;
  readonly palette: Palette;
  readonly unit: number;
}) {
  const colour = palette.series[series.colour];
  const stroke = series.principal ? PRINCIPAL_WIDTH : series.reference ? 1 : ORDINARY_WIDTH;
  return (
    <g>
      {series.line === "" ? null : (
        <path
          d={series.line}
          fill="none"
          stroke={colour}
          strokeWidth={stroke * unit}
          strokeLinejoin="round"
          strokeLinecap={series.reference ? "round" : "butt"}
          strokeDasharray={series.reference ? "1 3" : undefined}
        />
      )}
      {series.foot === null ? null : (
        <path
          d={series.marks.map((mark) => `M${mark.x.toFixed(2)} ${series.foot}V${mark.y.toFixed(2)}`).join("")}
          fill="none"
          stroke={colour}
          strokeOpacity={0.55}
        />
      )}
      {series.marks.map((mark) => (
        <g key={mark.x}>
          {mark.bar ? (
            <path
              d={`M${mark.x.toFixed(2)} ${mark.bar[0].toFixed(2)}V${mark.bar[1].toFixed(2)}`}
              stroke={colour}
              strokeWidth={1.6 * unit}
            />
          ) : null}
          <circle
            cx={mark.x.toFixed(2)}
            cy={mark.y.toFixed(2)}
            r={series.radius.toFixed(2)}
            fill={series.ring ? palette.paper : colour}
            stroke={series.ring ? colour : undefined}
            strokeWidth={series.ring ? 1.4 * unit : undefined}
          />
        </g>
      ))}
      {series.start ? (
        <circle
          cx={series.start.x.toFixed(2)}
          cy={series.start.y.toFixed(2)}
          r={(series.principal ? 3.4 : 2.6) * unit}
          fill={colour}
        />
      ) : null}
    </g>
  );
}

/** A label's runs as tspans; a raised or lowered run gives back its shift to the next. */
function Runs({ runs, fontSize }: { readonly runs: readonly LabelRun[]; readonly fontSize: number }) {
  const shiftOf = (run: LabelRun) =>
    run.shift === "sub" ? fontSize * 0.24 : run.shift === "sup" ? -fontSize * 0.36 : 0;
  const spans: ReactNode[] = [];
  let height = 0;
  let place = 0;
  for (const run of runs) {
    const variable = run.style === "variable";
    const size = fontSize * (variable ? VARIABLE_SCALE : 1) * (run.shift === "base" ? 1 : SHIFTED_SCALE);
    const shift = shiftOf(run);
    spans.push(
      <tspan
        key={place}
        dy={shift === height ? undefined : (shift - height).toFixed(2)}
        fontSize={size === fontSize ? undefined : size.toFixed(2)}
        fontFamily={variable ? VARIABLE_FACE : run.style === "blackboard" ? BLACKBOARD_FACE : undefined}
        fontStyle={variable ? "italic" : undefined}
      >
        {run.style === "blackboard" ? [...run.text].map((c) => BLACKBOARD_LETTERS.get(c) ?? c).join("") : run.text}
      </tspan>,
    );
    height = shift;
    place += 1;
  }
  return <>{spans}</>;
}
