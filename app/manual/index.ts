/** The manual: kinds, keys, values and formulas, from the definitions by which papers are checked. */
export { type ManualContents, manualContents } from "./contents.ts";
export { ManualPage } from "./manual-page.tsx";
