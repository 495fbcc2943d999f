/** Help while writing: suggestions, what the word under the caret means, what closes what is opened, tables from elsewhere. */
export { meaningGloss } from "./meaning-gloss.ts";
export { pairs } from "./pairs.ts";
export { pasting } from "./pasting.ts";
export { suggestionList } from "./suggestion-list.ts";
