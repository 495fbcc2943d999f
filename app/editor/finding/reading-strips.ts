/** The strips that read the paper on the page itself: what reads it is fetched with the first of them. */
export { OutlineStrip } from "./outline-strip.tsx";
export { RenameStrip } from "./rename-strip.tsx";
