import { renderToStaticMarkup } from "react-dom/server";
import { MemoryRouter } from "react-router";
import { expect, test } from "vitest";
import {
  BRANCHING_CAPTION,
  BranchingPicture,
  Choice,
  Field,
  localMoment,
  momentInWords,
  RunningHead,
} from "../../app/ui/index.ts";

test("the picture of the first page counts the arrivals that it draws", () => {
  const svg = renderToStaticMarkup(<BranchingPicture />);
  const words = ["None", "One", "Two", "Three", "Four", "Five", "Six"];
  const rings = svg.match(/<circle cx="0"/g)?.length ?? 0;
  expect(BRANCHING_CAPTION).toBe(`One simulated larva. ${words[rings]} of its lineages reach the shore.`);
  expect(svg).toContain(`aria-label="${BRANCHING_CAPTION}"`);
  expect(svg).not.toMatch(/NaN|Infinity|undefined/);
});

test("a field says what it is for, what helps and what is wrong, to everybody", () => {
  const html = renderToStaticMarkup(<Field label="Name" name="name" hint="As printed." fault="It is empty." />);
  const id = /<input[^>]* id="([^"]+)"/.exec(html)?.[1] ?? "";
  expect(html).toContain(`for="${id}"`);
  expect(html).toContain(`aria-describedby="${id}-hint ${id}-fault"`);
  expect(html).toContain('aria-invalid="true"');
  expect(html).toMatch(/id="[^"]+-fault" role="alert">It is empty\./);
  const sound = renderToStaticMarkup(
    <Choice label="as" name="role">
      <option>Author</option>
    </Choice>,
  );
  expect(sound).not.toContain("aria-");
});

test("the running head leads home", () => {
  const html = renderToStaticMarkup(
    <MemoryRouter>
      <RunningHead home="/shelf" title="How many?" />
    </MemoryRouter>,
  );
  expect(html).toContain('href="/shelf"');
  expect(html).toContain("How many?");
});

test.each([
  ["2026-03-02T14:32:00Z", "at 14:32"],
  ["2026-03-01T23:10:00Z", "yesterday"],
  ["2026-02-27T09:00:00Z", "on 27 February"],
  ["2024-02-27T09:00:00Z", "on 27 February 2024"],
])("%s, seen on 2 March 2026, is %s", (moment, words) => {
  expect(momentInWords(new Date(moment), new Date("2026-03-02T18:00:00Z"), "UTC")).toBe(words);
});

test("days are those of the reader's place", () => {
  const [moment, now] = [new Date("2026-03-01T23:30:00Z"), new Date("2026-03-02T10:00:00Z")];
  expect(momentInWords(moment, now, "Europe/Oslo")).toBe("at 00:30");
  expect(momentInWords(moment, now, "America/Bogota")).toBe("yesterday");
});

test("a moment is written in the time of the reader's place", () => {
  const moment = "2026-12-01T23:31:00.000Z";
  expect(localMoment(moment, "UTC")).toBe("1 Dec 2026, 23:31");
  // Oslo is an hour ahead in winter: a new day there. (IANA time zone database.)
  expect(localMoment(moment, "Europe/Oslo")).toBe("2 Dec 2026, 00:31");
  expect(localMoment("never", "UTC")).toBe("never");
});
