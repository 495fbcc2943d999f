import type { Frame } from "../../app/figures/curve.ts";
import type { FigureLayout } from "../../app/figures/index.ts";
import { labelBox, textBox } from "../../app/figures/ink.ts";
import { TICK_LENGTH } from "../../app/figures/layout-axes.ts";
import { runsWidth } from "../../app/figures/measure.ts";

export interface TextBox extends Frame {
  readonly text: string;
}

/** The rectangles of all text of a plate, by the widths that the layout itself reckons with. */
export function textBoxes(layout: FigureLayout): readonly TextBox[] {
  const { fontSize } = layout;
  return layout.plots.flatMap(({ plot, left, top, head }) => {
    const words = (runs: readonly { text: string }[]) => runs.map((run) => run.text).join("");
    const own: TextBox[] = [
      ...plot.xTicks
        .filter(({ shown }) => shown)
        .map(({ runs, position }) => {
          const baseline = plot.frame.bottom + TICK_LENGTH + fontSize;
          return { ...textBox(runs, position, baseline - fontSize * 0.36, "middle", fontSize), text: words(runs) };
        }),
      ...plot.yTicks.map(({ runs, position }) => {
        // Digits do not go below their baseline.
        const { left: from, right, top: above, bottom } = textBox(runs, plot.tickEnd, position, "end", fontSize);
        return { left: from, right, top: above, bottom: bottom - fontSize * 0.15, text: words(runs) };
      }),
      ...[plot.xLabel, plot.yLabel, ...plot.topLabels].flatMap((label) =>
        label ? [{ ...labelBox(label, fontSize, "baseline"), text: words(label.runs) }] : [],
      ),
      ...[...plot.labels, ...plot.dotLabels].map((label) => ({
        ...labelBox(label, fontSize, "middle"),
        text: words(label.runs),
      })),
    ];
    const heads: TextBox[] = head
      ? [
          {
            left: head.x,
            right: head.x + fontSize * 2 + runsWidth(head.runs, fontSize),
            top: head.y - fontSize * 0.9,
            bottom: head.y + fontSize * 0.2,
            text: head.letter,
          },
        ]
      : [];
    return [
      ...own.map((box) => ({
        ...box,
        left: box.left + left,
        right: box.right + left,
        top: box.top + top,
        bottom: box.bottom + top,
      })),
      ...heads,
    ];
  });
}

/** Pairs of texts that overlap by more than a hair. */
export function overlapping(boxes: readonly TextBox[]): readonly string[] {
  return boxes.flatMap((a, i) =>
    boxes.slice(i + 1).flatMap((b) => {
      const width = Math.min(a.right, b.right) - Math.max(a.left, b.left);
      const height = Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top);
      return width > 0.5 && height > 0.5 ? [`${a.text} | ${b.text}`] : [];
    }),
  );
}

/** Texts that leave the plate. */
export function outside(boxes: readonly TextBox[], { width, height }: FigureLayout): readonly string[] {
  return boxes.flatMap(({ left, right, top, bottom, text }) =>
    left < -0.5 || right > width + 0.5 || top < -1 || bottom > height + 0.5 ? [text] : [],
  );
}
