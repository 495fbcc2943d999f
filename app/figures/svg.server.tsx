import { renderToStaticMarkup } from "react-dom/server";
import { FigurePlate } from "./plate.tsx";
import type { Figure } from "./types.ts";

/**
 * A figure as an SVG file that stands alone: black and the series' colours on white, faces named with ones to take their
 * place, no style sheet needed.
 * @param width CSS pixels
 */
export function figureToSvg(figure: Figure, width = 660): string {
  return `<?xml version="1.0" encoding="UTF-8"?>\n${renderToStaticMarkup(<FigurePlate figure={figure} width={width} theme="print" />)}\n`;
}
