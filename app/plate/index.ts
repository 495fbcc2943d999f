/** A plate: one figure or table of a paper, large, with its values beside it. */
export { PlatePage } from "./plate-page.tsx";
