import { useEffect } from "react";

/** A moment in the reader's time: "1 Dec 2026, 14:31". @param zone IANA name; undefined: the machine's */
export function localMoment(iso: string, zone?: string): string {
  const time = new Date(iso);
  if (Number.isNaN(time.getTime())) return iso;
  return new Intl.DateTimeFormat("en-GB", {
    day: "numeric",
    month: "short",
    year: "numeric",
    hour: "2-digit",
    minute: "2-digit",
    timeZone: zone,
  }).format(time);
}

/**
 * Writes the moments of markup made on the server, which stand there in UTC, in the reader's own time: those that are
 * marked `data-local`, whenever the page is drawn.
 */
export function useLocalTimes(): void {
  useEffect(() => {
    for (const time of document.querySelectorAll<HTMLTimeElement>("time[data-local]"))
      time.textContent = localMoment(time.dateTime);
  });
}
