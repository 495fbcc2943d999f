/** The parts of the rule that read the paper on the page itself: what reads it is fetched with the first of them. */
export { moveOnRule, valueFault } from "./edit-rule.ts";
export { ParameterEntry } from "./parameter-entry.tsx";
