import { createElement } from "react";
import { renderToStaticMarkup } from "react-dom/server";
import { GalleyPaper, type GalleyPaperProps } from "./galley-paper.tsx";

/**
 * A galley as HTML, made on the server: the page that shows it loads neither the typesetting of formulas nor the plates,
 * and can be read before, or without, any script.
 */
export function renderGalley(props: GalleyPaperProps): string {
  return renderToStaticMarkup(createElement(GalleyPaper, props));
}
