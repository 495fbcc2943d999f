import { type EditorView, WidgetType } from "@codemirror/view";
import { flushSync } from "react-dom";
import { createRoot, type Root } from "react-dom/client";
import type { CellFace } from "../model/types.ts";
import { CellPlate } from "../parts/cell-plate.tsx";
import { PlateBoundary, PlateFault } from "../parts/plate-boundary.tsx";
import { element } from "./element.ts";
import { sheetHost } from "./host.ts";

const roots = new WeakMap<HTMLElement, Root>();

/** A cell on the sheet: its figure or table, caption and state. Drawn by React, so that a change keeps what stands. */
export class CellWidget extends WidgetType {
  readonly face: CellFace;
  /** The working is open beneath it. */
  readonly open: boolean;
  private readonly sign: string;

  constructor(face: CellFace, open: boolean) {
    super();
    this.face = face;
    this.open = open;
    this.sign = lookOf(face);
  }

  override eq(other: CellWidget): boolean {
    return this.open === other.open && this.sign === other.sign;
  }

  override get estimatedHeight(): number {
    return this.face.parts.reduce((height, { part }) => height + (part === "figure" ? 320 : 220), 46);
  }

  override toDOM(view: EditorView): HTMLElement {
    const made = element("div", "hl-cell");
    const root = createRoot(made);
    roots.set(made, root);
    made.dataset.slot = this.face.slot;
    this.draw(root, view);
    return made;
  }

  override updateDOM(dom: HTMLElement, view: EditorView): boolean {
    const root = roots.get(dom);
    if (root === undefined) return false;
    dom.dataset.slot = this.face.slot;
    this.draw(root, view);
    return true;
  }

  override destroy(dom: HTMLElement): void {
    const root = roots.get(dom);
    roots.delete(dom);
    // React refuses to unmount while it renders, and the text may be changed from within an event of React's.
    if (root !== undefined) queueMicrotask(() => root.unmount());
  }

  override ignoreEvent(): boolean {
    return true;
  }

  private draw(root: Root, view: EditorView): void {
    const host = view.state.facet(sheetHost);
    if (host === null) return;
    const shown = host.views.get(this.face.slot) ?? null;
    // At once, since the editor measures heights right after.
    flushSync(() =>
      root.render(
        <PlateBoundary sign={this.sign} title={this.face.title}>
          {shown?.fault === undefined ? (
            <CellPlate face={this.face} view={shown?.view ?? null} open={this.open} host={host} />
          ) : (
            <PlateFault title={this.face.title} fault={shown.fault} />
          )}
        </PlateBoundary>,
      ),
    );
  }
}

/** What a cell looks like depends on all of its face but where it stands, so that text above it may grow. */
function lookOf(face: CellFace): string {
  return JSON.stringify({ ...face, from: 0, to: 0, line: 0 });
}

/** Whether two faces look alike. Quick for those that share their parts, as faces of two answers mostly do. */
export function sameLook(a: CellFace, b: CellFace): boolean {
  if (a === b) return true;
  const names = Object.keys({ ...a, ...b }) as (keyof CellFace)[];
  return names.every(
    (name) => PLACE.has(name) || Object.is(a[name], b[name]) || JSON.stringify(a[name]) === JSON.stringify(b[name]),
  );
}

const PLACE: ReadonlySet<keyof CellFace> = new Set<keyof CellFace>(["from", "to", "line"]);
