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
    strip
      ?.querySelector<HTMLElement>("[data-first], .hl-strip-body button, .hl-strip-body a, .hl-strip-close")
      ?.focus();
    return () => {
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
