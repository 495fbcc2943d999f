/** A plate: one figure or table of a paper, large, with its values and what can be taken away. */
export { FILE_NAMES, type TakenAway, takeAway } from "./files.ts";
export { findPlate, type Plate, type PlateFace, plateFace } from "./plate.ts";
export { PlatePage } from "./plate-page.tsx";
