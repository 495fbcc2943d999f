import { type EditorView, WidgetType } from "@codemirror/view";
import { element } from "./element.ts";
import { sheetHost } from "./host.ts";

/** Stands above the lines of a working in the margin: whose it is, and the way to put it away. */
export class WorkingHead extends WidgetType {
  private readonly title: string;
  private readonly slot: string;
  constructor(title: string, slot: string) {
    super();
    this.title = title;
    this.slot = slot;
  }
  override eq(other: WorkingHead): boolean {
    return this.title === other.title && this.slot === other.slot;
  }
  override get estimatedHeight(): number {
    return 24;
  }
  override toDOM(view: EditorView): HTMLElement {
    const away = element("button", "command hl-small", ["Put away"], {
      type: "button",
      "aria-label": `Put away, working of ${this.title}`,
    });
    // The caret stays where it is, or the working would close under the pointer.
    away.addEventListener("mousedown", (event) => event.preventDefault());
    away.addEventListener("click", () => view.state.facet(sheetHost)?.commands.putAway(this.slot));
    return element("div", "hl-working-head", [element("b", "", [`Working of ${this.title}`]), " ", away]);
  }
  override ignoreEvent(): boolean {
    return true;
  }
}
