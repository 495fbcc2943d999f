import { CHECK } from "./check/model.ts";
import { COUNTS } from "./counts/model.ts";
import { FIGURE } from "./figure/model.ts";
import { FORMULA } from "./formula/model.ts";
import { GENERATING_FUNCTION } from "./generating_function/model.ts";
import type { Kind } from "./kind.ts";
import { defineKind } from "./kind.ts";
import { PARAMETERS } from "./parameters/model.ts";
import { PORTRAIT } from "./portrait/model.ts";
import { PROCESS } from "./process/model.ts";
import { PROFILE } from "./profile/model.ts";
import { SIMULATE } from "./simulate/model.ts";
import { SOLVE } from "./solve/model.ts";
import { SWEEP } from "./sweep/model.ts";
import { TABLE } from "./table/model.ts";
import { TAIL } from "./tail/model.ts";
import { YAGLOM } from "./yaglom/model.ts";

/** Every kind of cell, by the word of its fence, in the order of the manual. A new kind is a folder and a line here. */
export const KINDS: ReadonlyMap<string, Kind> = new Map(
  [
    defineKind(PARAMETERS),
    defineKind(PROCESS),
    defineKind(PROFILE),
    defineKind(GENERATING_FUNCTION),
    defineKind(COUNTS),
    defineKind(TAIL),
    defineKind(YAGLOM),
    defineKind(SIMULATE),
    defineKind(PORTRAIT),
    defineKind(SWEEP),
    defineKind(FIGURE),
    defineKind(TABLE),
    defineKind(FORMULA),
    defineKind(SOLVE),
    defineKind(CHECK),
  ].map((kind) => [kind.documentation.name, kind]),
);
