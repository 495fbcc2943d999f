import { useEffect, useRef, useState } from "react";

interface Props {
  readonly label: string;
  /** What stands in the field at first: the whole source, or the digit that opened it. */
  readonly first: string;
  onEnter(source: string): void;
  onEscape(): void;
}

/** Where a parameter's value is typed. Enter sets it, Esc and leaving put it back. */
export function ParameterField({ label, first, onEnter, onEscape }: Props) {
  const [source, setSource] = useState(first);
  const field = useRef<HTMLInputElement>(null);
  useEffect(() => {
    const place = field.current;
    if (place === null) return;
    place.focus();
    if (place.value.length > 1) place.select();
  }, []);
  return (
    <input
      ref={field}
      className="hl-par-field"
      aria-label={`${label}: a number or a formula; Enter sets it`}
      value={source}
      size={Math.max(5, source.length)}
      autoComplete="off"
      spellCheck={false}
      onChange={(event) => setSource(event.target.value)}
      onBlur={onEscape}
      onKeyDown={(event) => {
        if (event.key === "Enter" && source.trim() !== "") onEnter(source.trim());
        else if (event.key === "Escape" || event.key === "Enter") onEscape();
        else return;
        event.preventDefault();
        event.stopPropagation();
      }}
    />
  );
}
