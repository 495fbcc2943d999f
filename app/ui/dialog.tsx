import { type ReactNode, useEffect, useId, useRef } from "react";

/**
 * A dialog over the page; the page beneath can be neither reached nor read out while it is open.
 * Rendered open on the server, it stands in the page until the script makes it modal.
 * @param onClose called when it is closed by Esc
 */
export function Dialog({
  title,
  onClose,
  children,
}: {
  readonly title: string;
  readonly onClose: () => void;
  readonly children: ReactNode;
}) {
  const id = useId();
  const ref = useRef<HTMLDialogElement>(null);
  useEffect(() => {
    const dialog = ref.current;
    if (!dialog) return;
    dialog.removeAttribute("open");
    dialog.showModal();
    return () => dialog.close();
  }, []);
  return (
    <dialog
      ref={ref}
      open
      className="dialog"
      aria-labelledby={id}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
    >
      <h2 id={id} className="text-[27px] leading-[34px] mb-3">
        {title}
      </h2>
      {children}
    </dialog>
  );
}
