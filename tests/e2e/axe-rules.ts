/** Common practice: axe-core's rules for WCAG 2.2 A and AA. */
export const RULES = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"];
