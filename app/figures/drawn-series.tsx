import { DOT_RADIUS, type Mark, ORDINARY_WIDTH, type PlacedSeries, PRINCIPAL_WIDTH } from "./layout-series.ts";
import type { Palette } from "./palette.ts";

const THIN_WIDTH = 0.9;
const RING_WIDTH = 1.4;
const BAR_WIDTH = 1.6;

/** The band of a series: its colour at 16 %, no outline. */
export function DrawnBand({ series, palette }: { readonly series: PlacedSeries; readonly palette: Palette }) {
  return series.band === "" ? null : <path d={series.band} fill={palette.series[series.colour]} fillOpacity={0.16} />;
}

/** A series' line or marks, its bars, dots and arrowhead. */
export function DrawnSeries({
  series,
  palette,
  unit,
}: {
  readonly series: PlacedSeries;
  readonly palette: Palette;
  readonly unit: number;
}) {
  const colour = palette.series[series.colour];
  const { start, arrow } = series;
  return (
    <g>
      {series.line === "" ? null : (
        <path
          d={series.line}
          fill="none"
          stroke={colour}
          strokeWidth={lineWidth(series) * unit}
          strokeLinejoin="round"
          strokeLinecap={series.reference ? "round" : "butt"}
          strokeDasharray={series.reference ? "1 3" : undefined}
        />
      )}
      {series.foot === null ? null : (
        <path d={stems(series.marks, series.foot)} fill="none" stroke={colour} strokeOpacity={0.55} />
      )}
      {series.marks.map((mark) => (
        <DrawnMark
          key={`${mark.x} ${mark.y}`}
          mark={mark}
          radius={series.radius}
          filling={series.ring === null ? colour : series.ring === "open" ? "none" : palette.paper}
          colour={colour}
          unit={unit}
        />
      ))}
      {start ? <circle {...at(start)} r={(series.principal ? 3.4 : 2.6) * unit} fill={colour} /> : null}
      {arrow ? (
        <path d={`M${arrow.map((p) => `${p.x.toFixed(2)} ${p.y.toFixed(2)}`).join("L")}Z`} fill={colour} />
      ) : null}
      {series.dots.map((dot) =>
        dot.hollow ? (
          <circle
            key={`${dot.x} ${dot.y}`}
            {...at(dot)}
            r={DOT_RADIUS * unit}
            fill={palette.paper}
            stroke={colour}
            strokeWidth={RING_WIDTH * unit}
          />
        ) : (
          <circle key={`${dot.x} ${dot.y}`} {...at(dot)} r={DOT_RADIUS * unit} fill={colour} />
        ),
      )}
    </g>
  );
}

const lineWidth = ({ principal, reference, thin }: PlacedSeries) =>
  principal ? PRINCIPAL_WIDTH : reference ? 1 : thin ? THIN_WIDTH : ORDINARY_WIDTH;

const at = ({ x, y }: { readonly x: number; readonly y: number }) => ({ cx: x.toFixed(2), cy: y.toFixed(2) });

const stems = (marks: readonly Mark[], foot: number) =>
  marks.flatMap(({ x, y }) => (y === null ? [] : [`M${x.toFixed(2)} ${foot.toFixed(2)}V${y.toFixed(2)}`])).join("");

interface MarkProps {
  readonly mark: Mark;
  readonly radius: number;
  /** What the mark is filled with: its own colour, or as a ring paper or nothing. */
  readonly filling: string;
  readonly colour: string;
  readonly unit: number;
}

/** A point with the bar of its interval, without caps; a mean is a ring. */
function DrawnMark({ mark: { x, y, bar }, radius, filling, colour, unit }: MarkProps) {
  return (
    <g>
      {bar ? (
        <path
          d={`M${x.toFixed(2)} ${bar[0].toFixed(2)}V${bar[1].toFixed(2)}`}
          stroke={colour}
          strokeWidth={BAR_WIDTH * unit}
        />
      ) : null}
      {y === null ? null : filling !== colour ? (
        <circle
          {...at({ x, y })}
          r={radius.toFixed(2)}
          fill={filling}
          stroke={colour}
          strokeWidth={RING_WIDTH * unit}
        />
      ) : (
        <circle {...at({ x, y })} r={radius.toFixed(2)} fill={colour} />
      )}
    </g>
  );
}
