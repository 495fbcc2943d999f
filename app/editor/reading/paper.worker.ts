/// <reference lib="webworker" />
import type { FromWorker, Told } from "../model/messages.ts";
import { SheetReader } from "./sheet-reader.ts";

/** The page's worker: reads, plans, evaluates and draws up the sheet, so that a keystroke costs the page nothing. */
const reader = new SheetReader();
let unanswered = 0;

self.onmessage = ({ data }: MessageEvent<Told>) => {
  reader.hear(data.message, data.have);
  unanswered += 1;
  // Behind the messages that are in the queue already: they are answered together.
  if (unanswered === 1) setTimeout(answer, 0);
};

function answer(): void {
  const answers = unanswered;
  unanswered = 0;
  const begun = performance.now();
  let message: FromWorker;
  try {
    message = { tell: "sheet", answers, model: reader.sheet(), seconds: (performance.now() - begun) / 1000 };
  } catch (error) {
    message = { tell: "fault", answers, message: error instanceof Error ? error.message : String(error) };
  }
  self.postMessage(message);
}
