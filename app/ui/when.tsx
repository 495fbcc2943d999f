import { useEffect, useState } from "react";

const DAY_MS = 24 * 60 * 60 * 1000;

/**
 * A moment in words: "at 14:32" today, "yesterday", "on 2 March", "on 2 March 2024".
 * @param zone IANA name of the time zone; undefined: the machine's
 */
export function momentInWords(moment: Date, now: Date, zone?: string): string {
  const part = (date: Date, options: Intl.DateTimeFormatOptions) =>
    new Intl.DateTimeFormat("en-GB", { ...options, timeZone: zone }).format(date);
  const day = (date: Date) => part(date, { year: "numeric", month: "2-digit", day: "2-digit" });
  if (day(moment) === day(now)) return `at ${part(moment, { hour: "2-digit", minute: "2-digit" })}`;
  if (day(moment) === day(new Date(now.getTime() - DAY_MS))) return "yesterday";
  const sameYear = part(moment, { year: "numeric" }) === part(now, { year: "numeric" });
  return `on ${part(moment, { day: "numeric", month: "long", ...(sameYear ? {} : { year: "numeric" }) })}`;
}

/** The server does not know the reader's time zone: it writes the date of UTC, and the browser its own. */
export function When({ moment, now }: { readonly moment: string; readonly now: string }) {
  const [zone, setZone] = useState<string | undefined>("UTC");
  useEffect(() => setZone(undefined), []);
  return <time dateTime={moment}>{momentInWords(new Date(moment), new Date(now), zone)}</time>;
}
