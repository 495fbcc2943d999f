/// <reference lib="webworker" />
import type { FromWorker, Told } from "../model/messages.ts";
import { SheetPacker } from "../model/packing.ts";
import { BorderFinder } from "./border-finder.ts";
import { SheetReader } from "./sheet-reader.ts";

/** The page's worker: reads, plans, evaluates and draws up the sheet, so that a keystroke costs the page nothing. */
const reader = new SheetReader();
const finder = new BorderFinder();
/** How long the worker has nothing to answer before it looks for borders, in ms. */
const REST_MS = 400;
const packer = new SheetPacker();
let unanswered = 0;
let have = 0;
let resting: ReturnType<typeof setTimeout> | undefined;
let toldBorders = "{}";

self.onmessage = ({ data }: MessageEvent<Told>) => {
  const { message } = data;
  if (message.tell === "values") {
    const { question, formulas } = message;
    self.postMessage({ tell: "values", answers: 0, question, values: reader.values(formulas) } satisfies FromWorker);
    return;
  }
  have = data.have;
  reader.hear(message, have);
  if (message.tell === "ahead") return;
  clearTimeout(resting);
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
    const model = packer.pack(reader.sheet(), have);
    message = { tell: "sheet", answers, model, seconds: (performance.now() - begun) / 1000 };
  } catch (error) {
    message = { tell: "fault", answers, message: error instanceof Error ? error.message : String(error) };
  }
  self.postMessage(message);
  const ground = reader.ground();
  if (ground === null) return;
  finder.stand(ground);
  resting = setTimeout(lookForBorders, REST_MS);
}

/** A step at a time, so that a message never waits for more than one. */
function lookForBorders(): void {
  if (finder.step()) {
    resting = setTimeout(lookForBorders, 0);
    return;
  }
  const borders = finder.faces();
  const sign = JSON.stringify(borders);
  if (sign === toldBorders) return;
  toldBorders = sign;
  self.postMessage({ tell: "borders", answers: 0, borders } satisfies FromWorker);
}
