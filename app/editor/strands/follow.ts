import { EditorView } from "@codemirror/view";
import { focusPlate } from "../text/moving.ts";
import type { Lights } from "./lights.ts";
import type { Lit } from "./types.ts";

/** What is lit, and where one can come back to from what was followed. */
export interface Trail {
  lit(): Lit | null;
  readonly lights: Lights;
  readonly sheet: HTMLElement;
  /** Where in the text a cell stands now. */
  placeOf(slot: string): number | null;
  strandsOf(slot: string): readonly number[];
  onBack(line: number | null): void;
}

interface Station {
  readonly anchor: number;
  readonly head: number;
  readonly scroll: number;
}

const trails = new WeakMap<EditorView, Walk>();

/** Follows strands from number to cell to parameter, and back to where one was. */
class Walk {
  private readonly view: EditorView;
  private readonly trail: Trail;
  private readonly stations: Station[] = [];

  constructor(view: EditorView, trail: Trail) {
    this.view = view;
    this.trail = trail;
  }

  follow(): boolean {
    const lit = this.trail.lit();
    if (lit === null || lit.lit === "strand") return false;
    if (lit.lit === "cord") return this.toParameter(this.trail.strandsOf(lit.slot)[0]);
    const slot = lit.faces.flatMap(({ cells }) => cells)[0];
    if (slot !== undefined) return this.toCell(slot);
    return this.toParameter(lit.faces.flatMap(({ reads }) => reads)[0]);
  }

  back(): boolean {
    const station = this.stations.pop();
    if (station === undefined) return false;
    const { length } = this.view.state.doc;
    this.trail.lights.letGo();
    this.view.focus();
    this.view.dispatch({
      selection: { anchor: Math.min(station.anchor, length), head: Math.min(station.head, length) },
    });
    window.scrollTo({ top: station.scroll });
    this.tell();
    return true;
  }

  private toCell(slot: string): boolean {
    const at = this.trail.placeOf(slot);
    if (at === null) return false;
    this.leave();
    this.view.dispatch({ effects: EditorView.scrollIntoView(at, { y: "center" }) });
    this.trail.lights.hold(slot);
    focusPlate(this.view, slot);
    return true;
  }

  private toParameter(place: number | undefined): boolean {
    const parameter = place === undefined ? undefined : this.trail.sheet.querySelectorAll(".hl-par")[place];
    const handle = parameter?.querySelector<HTMLElement>("[role=spinbutton]");
    if (handle == null) return false;
    this.leave();
    handle.focus();
    handle.scrollIntoView({ block: "nearest", inline: "center" });
    return true;
  }

  private leave(): void {
    const { anchor, head } = this.view.state.selection.main;
    this.stations.push({ anchor, head, scroll: window.scrollY });
    this.tell();
  }

  private tell(): void {
    const station = this.stations.at(-1);
    const { doc } = this.view.state;
    this.trail.onBack(station === undefined ? null : doc.lineAt(Math.min(station.head, doc.length)).number);
  }
}

/** Lets strands be followed in a sheet; ends with the sheet's editor. */
export function layTrail(view: EditorView, trail: Trail): void {
  trails.set(view, new Walk(view, trail));
}

/**
 * *Follow the strand*: from the number that is lit to its cell; again, from a cell up to its first parameter.
 * @returns false when nothing is lit that leads further
 */
export function followStrand(view: EditorView): boolean {
  return trails.get(view)?.follow() ?? false;
}

/** Back to where one was before following; as often as one followed. @returns false when one has not followed */
export function followBack(view: EditorView): boolean {
  return trails.get(view)?.back() ?? false;
}
