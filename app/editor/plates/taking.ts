import { createElement } from "react";
import { flushSync } from "react-dom";
import { createRoot } from "react-dom/client";
import { type Figure, FigurePlate, figureToCsv } from "../../figures/index.ts";
import { facesFor } from "./faces.ts";
import type { CopyAs } from "./figure-acts.ts";

/** As wide as the column of text [px]. */
const WIDTH = 660;
/** Points of a PNG to a CSS pixel: sharp in print at that width. */
const SHARPNESS = 3;

/** A figure, or its points, as what is taken away of it. */
export function takenOf(figure: Figure, as: CopyAs): Promise<Blob> {
  return TAKEN[as](figure);
}

const TAKEN: Readonly<Record<CopyAs, (figure: Figure) => Promise<Blob>>> = {
  svg: async (figure) => new Blob([svgText(figureSvg(figure))], { type: "image/svg+xml" }),
  csv: async (figure) => new Blob([figureToCsv(figure)], { type: "text/csv" }),
  png: async (figure) => picture(figureSvg(figure)),
};

/** A figure in black and colours on white, as an element that stands alone. */
function figureSvg(figure: Figure): SVGSVGElement {
  const place = document.createElement("div");
  const root = createRoot(place);
  flushSync(() => root.render(createElement(FigurePlate, { figure, width: WIDTH, theme: "print" })));
  const drawn = place.querySelector("svg");
  if (drawn === null) throw new Error("The figure was not drawn.");
  const svg = drawn.cloneNode(true);
  root.unmount();
  if (!(svg instanceof SVGSVGElement)) throw new Error("The figure was not drawn.");
  return svg;
}

function svgText(svg: SVGSVGElement): string {
  return `<?xml version="1.0" encoding="UTF-8"?>\n${new XMLSerializer().serializeToString(svg)}\n`;
}

/** The figure as PNG on white, in the page's own faces: an image is drawn without the page, so they go with it. */
async function picture(svg: SVGSVGElement): Promise<Blob> {
  const style = document.createElementNS("http://www.w3.org/2000/svg", "style");
  style.textContent = await facesFor(svg.textContent ?? "");
  svg.prepend(style);
  const address = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svgText(svg))}`;
  const image = new Image();
  image.src = address;
  await image.decode();
  const canvas = document.createElement("canvas");
  canvas.width = Math.round(svg.width.baseVal.value * SHARPNESS);
  canvas.height = Math.round(svg.height.baseVal.value * SHARPNESS);
  const ground = canvas.getContext("2d");
  if (ground === null) throw new Error("This browser draws no pictures.");
  ground.fillStyle = "#fff";
  ground.fillRect(0, 0, canvas.width, canvas.height);
  ground.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((give, refuse) =>
    canvas.toBlob((blob) => (blob === null ? refuse(new Error("The picture is too large.")) : give(blob)), "image/png"),
  );
}
