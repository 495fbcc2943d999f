/** The sheet: where a paper is written. Routes render SheetPage; the server speaks the words of protocol.ts. */

export type { Starts } from "./first/starts.ts";
export type { ShownRecords } from "./live/paper-session.ts";
export { SheetPage, type SheetPageProps } from "./parts/sheet-page.tsx";
