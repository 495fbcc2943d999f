/** How long a handle is waited for, in ms: the text has to be read before the rule shows what was changed. */
const PATIENCE_MS = 2000;

/** The value of a parameter on the rule, which takes the keys; null: it does not stand there. */
export function handleOf(name: string): HTMLElement | null {
  const handles = document.querySelectorAll<HTMLElement>(".hl-rule [data-parameter]");
  return [...handles].find(({ dataset }) => dataset.parameter === name) ?? null;
}

/** The parameter whose value has the keys; null: none has. */
export function heldParameter(): string | null {
  const held = document.activeElement;
  return held instanceof HTMLElement ? (held.dataset.parameter ?? null) : null;
}

/**
 * Gives the keys to a parameter's value, as soon as it stands on the rule, and again when it loses them by being moved
 * there; not when they have gone elsewhere than the rule, nor after another key or press.
 */
export function focusHandle(name: string): void {
  const ended = new AbortController();
  const end = () => ended.abort();
  for (const pressed of ["keydown", "pointerdown"] as const)
    window.addEventListener(pressed, end, { capture: true, signal: ended.signal });
  const begun = performance.now();
  const look = () => {
    if (performance.now() - begun > PATIENCE_MS || !isFree(document.activeElement)) end();
    if (ended.signal.aborted) return;
    const handle = handleOf(name);
    if (handle !== null && document.activeElement !== handle) handle.focus();
    requestAnimationFrame(look);
  };
  requestAnimationFrame(look);
}

function isFree(held: Element | null): boolean {
  return held === null || held === document.body || held.closest(".hl-rule") !== null;
}
