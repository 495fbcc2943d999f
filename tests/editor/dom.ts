/** What CodeMirror and the plates ask of a browser and jsdom has not: boxes of text, and word of their sizes. */
export function likeABrowser(): void {
  const noBoxes = Object.assign([], { item: () => null }) as unknown as DOMRectList;
  Range.prototype.getClientRects = () => noBoxes;
  Range.prototype.getBoundingClientRect = () => new DOMRect(0, 0, 0, 0);
  Object.assign(globalThis, {
    ResizeObserver: class {
      observe() {}
      unobserve() {}
      disconnect() {}
    },
  });
}
