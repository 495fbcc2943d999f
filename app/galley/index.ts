/** The galley: a paper typeset for reading. Its looks are in galley.css, which the page that shows it imports. */
export { ProseBlocks } from "./blocks.tsx";
export { GalleyPaper, type GalleyPaperProps } from "./galley-paper.tsx";
export { type PlateMarkup, renderPlate } from "./plate.tsx";
export { renderGalley } from "./render.ts";
export { makeSetting, type Setting } from "./setting.ts";
