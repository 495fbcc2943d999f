import type { End, SceneCell } from "./types.ts";

/** A cord as it is laid: its ends within what is drawn, and whether it goes on beyond. */
export interface CordRun {
  readonly cell: SceneCell;
  readonly ring: number | null;
  readonly ties: readonly End[];
  readonly from: number;
  readonly to: number;
  readonly leavesAbove: boolean;
  readonly leavesBelow: boolean;
  readonly lit: boolean;
}
