import { DrawnBand, DrawnSeries } from "./drawn-series.tsx";
import type { LabelRun } from "./label.ts";
import type { PlacedLabel } from "./labels.ts";
import { TICK_LENGTH } from "./layout-axes.ts";
import { type PlacedSeries, weight } from "./layout-series.ts";
import { PALETTES, type Palette, type Theme } from "./palette.ts";
import type { PlacedLine, PlotLayout } from "./plot-layout.ts";
import { Runs } from "./runs.tsx";

interface Look {
  readonly palette: Palette;
  readonly fontSize: number;
  readonly theme: Theme;
}

/** One pair of axes with what is drawn between them. */
export function Plot({ plot, theme }: { readonly plot: PlotLayout; readonly theme: Theme }) {
  const palette = PALETTES[theme];
  const look: Look = { palette, fontSize: plot.fontSize, theme };
  return (
    <>
      <Axes plot={plot} look={look} />
      {plot.series.map((series) => (
        <DrawnBand key={series.name} series={series} palette={palette} />
      ))}
      {[...plot.series].sort(byWeight).map((series) => (
        <DrawnSeries key={series.name} series={series} palette={palette} unit={plot.fontSize / 12.5} />
      ))}
      {plot.labels.map((label) => (
        <CurveLabel key={placeOf(label)} label={label} look={look} halo={false} />
      ))}
      {plot.dotLabels.map((label) => (
        <CurveLabel key={placeOf(label)} label={label} look={look} halo />
      ))}
      {plot.topLabels.map((label) => (
        <BaseLabel key={placeOf(label)} label={label} look={look} fill={palette.quiet} />
      ))}
    </>
  );
}

const byWeight = (a: PlacedSeries, b: PlacedSeries) => weight(a) - weight(b);

const placeOf = ({ tex, x, y }: PlacedLabel) => `${tex} ${x} ${y}`;

function Axes({ plot, look }: { readonly plot: PlotLayout; readonly look: Look }) {
  const { frame, fontSize } = plot;
  const { palette } = look;
  const text = (runs: readonly LabelRun[]) => <Runs runs={runs} fontSize={fontSize} theme={look.theme} />;
  return (
    <g fill={palette.quiet}>
      <path
        d={`M${frame.left.toFixed(2)} ${frame.bottom.toFixed(2)}H${frame.right.toFixed(2)}${plot.xTicks.map((tick) => `M${tick.position.toFixed(2)} ${frame.bottom.toFixed(2)}v${TICK_LENGTH}`).join("")}`}
        fill="none"
        stroke={palette.quiet}
      />
      {plot.xTicks.map((tick) =>
        tick.shown ? (
          <text
            key={tick.at}
            x={tick.position.toFixed(2)}
            y={(frame.bottom + TICK_LENGTH + fontSize).toFixed(2)}
            textAnchor="middle"
          >
            {text(tick.runs)}
          </text>
        ) : null,
      )}
      {plot.yTicks.map((tick) => (
        <text
          key={tick.at}
          x={plot.tickEnd.toFixed(2)}
          y={(tick.position + fontSize * 0.36).toFixed(2)}
          textAnchor="end"
        >
          {text(tick.runs)}
        </text>
      ))}
      {plot.levels.map((level) => (
        <g key={level.at}>
          <Reference
            line={level}
            d={`M${frame.left.toFixed(2)} ${level.at.toFixed(2)}H${frame.right.toFixed(2)}`}
            look={look}
          />
          {level.start ? (
            <circle cx={frame.left.toFixed(2)} cy={level.at.toFixed(2)} r={2.6} fill={palette.edge} />
          ) : null}
        </g>
      ))}
      {plot.verticals.map((vertical) => (
        <Reference
          key={vertical.at}
          line={vertical}
          d={`M${vertical.at.toFixed(2)} ${frame.bottom.toFixed(2)}V${(frame.top - 4).toFixed(2)}`}
          look={look}
        />
      ))}
      {[plot.xLabel, plot.yLabel].map((label) =>
        label ? <BaseLabel key={placeOf(label)} label={label} look={look} fill={palette.ink} /> : null,
      )}
    </g>
  );
}

function Reference({ line, d, look }: { readonly line: PlacedLine; readonly d: string; readonly look: Look }) {
  return (
    <path
      d={d}
      fill="none"
      stroke={look.palette.edge}
      strokeWidth={line.fine ? 0.8 : undefined}
      strokeDasharray={line.fine ? undefined : "1 3"}
      strokeLinecap={line.fine ? undefined : "round"}
    />
  );
}

/** A label that stands on its baseline: a variable of an axis, a vertical reference. */
function BaseLabel({ label, look, fill }: { readonly label: PlacedLabel; readonly look: Look; readonly fill: string }) {
  return (
    <text x={label.x.toFixed(2)} y={label.y.toFixed(2)} textAnchor={label.anchor} fill={fill}>
      <Runs runs={label.runs} fontSize={look.fontSize} theme={look.theme} />
    </text>
  );
}

interface CurveLabelProps {
  readonly label: PlacedLabel;
  readonly look: Look;
  /** Within the plot a rim of paper keeps the text apart from lines that pass behind it. */
  readonly halo: boolean;
}

function CurveLabel({ label, look, halo }: CurveLabelProps) {
  const { palette, fontSize } = look;
  const colour = label.colour === "quiet" ? palette.quiet : palette.series[label.colour];
  return (
    <g>
      {label.leader ? <path d={label.leader} fill="none" stroke={colour} strokeWidth={0.8} /> : null}
      <text
        x={label.x.toFixed(2)}
        y={(label.y + fontSize * 0.36).toFixed(2)}
        textAnchor={label.anchor}
        fill={colour}
        {...(halo ? { stroke: palette.paper, strokeWidth: 3, strokeLinejoin: "round", paintOrder: "stroke" } : {})}
      >
        <Runs runs={label.runs} fontSize={fontSize} theme={look.theme} />
      </text>
    </g>
  );
}
