/** Plates on the server: found in a paper, told to their page, taken away as files. */
export { FILE_NAMES, type TakenAway, takeAway } from "./files.server.ts";
export { findPlate, type Plate, type PlateFace, plateFace } from "./plate.ts";
