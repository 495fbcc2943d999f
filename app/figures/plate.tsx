import { type FigureLayout, layoutOnPage, type PlacedPlot } from "./layout.ts";
import { runsWidth } from "./measure.ts";
import { PALETTES, type Palette, type Theme } from "./palette.ts";
import { Plot } from "./plot.tsx";
import { Runs } from "./runs.tsx";
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
const FILE_FACE = "Commissioner, Helvetica, Arial, sans-serif";

/** One plate as SVG: axis lines only under the data, direct labels, no legend, no box, no grid. Says its finding to a screen reader. */
export function FigurePlate({ figure, width = 500, height, theme = "page", className }: FigurePlateProps) {
  const layout = layoutOnPage(figure, { width, height });
  const onPage = theme === "page";
  return (
    <svg
      xmlns="http://www.w3.org/2000/svg"
      viewBox={`0 0 ${layout.width} ${layout.height}`}
      width={layout.width}
      height={layout.height}
      role="img"
      aria-label={figure.alternative}
      className={className}
      style={onPage ? { maxWidth: "100%", height: "auto", display: "block", ...FIGURES } : FIGURES}
      fontFamily={onPage ? TEXT_FACE : FILE_FACE}
      fontSize={layout.fontSize}
    >
      <title>{figure.alternative}</title>
      <Plots layout={layout} theme={theme} />
    </svg>
  );
}

const FIGURES = { fontVariantNumeric: "lining-nums tabular-nums" } as const;

function Plots({ layout, theme }: { readonly layout: FigureLayout; readonly theme: Theme }) {
  return layout.plots.map((placed) => (
    <g key={`${placed.left} ${placed.top}`}>
      <Head placed={placed} palette={PALETTES[theme]} fontSize={layout.fontSize} theme={theme} />
      {placed.left === 0 && placed.top === 0 ? (
        <Plot plot={placed.plot} theme={theme} />
      ) : (
        <g transform={`translate(${placed.left.toFixed(2)} ${placed.top.toFixed(2)})`}>
          <Plot plot={placed.plot} theme={theme} />
        </g>
      )}
    </g>
  ));
}

/** The letter of a panel and its title. */
function Head({
  placed: { head },
  palette,
  fontSize,
  theme,
}: {
  readonly placed: PlacedPlot;
  readonly palette: Palette;
  readonly fontSize: number;
  readonly theme: Theme;
}) {
  if (!head) return null;
  const after = runsWidth([{ text: head.letter, style: "upright", shift: "base" }], fontSize) + fontSize * 0.5;
  return (
    <g fill={palette.ink}>
      <text x={head.x.toFixed(2)} y={head.y.toFixed(2)} fontWeight={560}>
        {head.letter}
      </text>
      {head.runs.length === 0 ? null : (
        <text x={(head.x + after).toFixed(2)} y={head.y.toFixed(2)}>
          <Runs runs={head.runs} fontSize={fontSize} theme={theme} />
        </text>
      )}
    </g>
  );
}
