/** PDFs by TeX, confined. */
export { TexPdfService } from "./service.ts";
