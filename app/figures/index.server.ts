/** What only the server makes of figures: files. */
export { figureToSvg } from "./svg.server.tsx";
