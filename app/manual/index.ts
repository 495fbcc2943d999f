/** The manual: kinds, keys, values and formulas, from the definitions by which papers are checked. */
export { ManualPage } from "./manual-page.tsx";
