import { type ReactNode, useEffect, useRef } from "react";
import { Command } from "../../ui/index.ts";

interface Props {
  readonly title: string;
  readonly children: ReactNode;
  onClose(): void;
}

/**
 * A strip between rules above the tail line. It takes the keys when it opens and gives them back when it is put away,
 * unless they have gone elsewhere meanwhile.
 */
export function Strip({ title, children, onClose }: Props) {
  const place = useRef<HTMLElement>(null);
  useEffect(() => {
    const before = document.activeElement;
    const strip = place.current;
    const take = (): boolean => {
      const first =
        strip?.querySelector<HTMLElement>("[data-first]") ??
        strip?.querySelector<HTMLElement>(".hl-strip-body button, .hl-strip-body a");
      (first ?? strip?.querySelector<HTMLElement>(".hl-strip-close"))?.focus();
      return first != null;
    };
    // What is fetched first comes a little later, and takes the keys if they still are at Close.
    const watch = new MutationObserver(() => {
      if (document.activeElement?.matches(".hl-strip-close") !== true || take()) watch.disconnect();
    });
    if (!take() && strip !== null) watch.observe(strip, { childList: true, subtree: true });
    return () => {
      watch.disconnect();
      // By now the strip is off the page, and what had the keys in it has lost them.
      const lost = document.activeElement === null || document.activeElement === document.body;
      if (lost && before instanceof HTMLElement && before.isConnected) before.focus({ preventScroll: true });
    };
  }, []);
  return (
    <section className="hl-strip" aria-label={title} ref={place}>
      <div className="hl-strip-head">
        <h2>{title}</h2>
        <Command className="hl-strip-close" onClick={onClose}>
          Close
        </Command>
      </div>
      <div className="hl-strip-body">{children}</div>
    </section>
  );
}
