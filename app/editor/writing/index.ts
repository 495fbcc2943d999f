/** Help while writing: suggestions, what the word under the caret means, what closes what is opened. */
export { meaningGloss } from "./meaning-gloss.ts";
export { pairs } from "./pairs.ts";
export { suggestionList } from "./suggestion-list.ts";
