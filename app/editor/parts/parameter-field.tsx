import { useEffect, useId, useRef, useState } from "react";

interface Props {
  readonly name: string;
  readonly label: string;
  /** What stands in the field at first: the whole source, or the digit that opened it. */
  readonly first: string;
  /** Why what was entered cannot stand; "" where nothing stands against it. */
  readonly fault: string;
  /** Something else is written. */
  onWrite(): void;
  onEnter(source: string): void;
  onEscape(): void;
  onLeave(): void;
}

/** Where a parameter's value is typed. Enter sets it, Esc and leaving put it back. */
export function ParameterField({ name, label, first, fault, onWrite, onEnter, onEscape, onLeave }: Props) {
  const [source, setSource] = useState(first);
  const description = useId();
  const field = useRef<HTMLInputElement>(null);
  useEffect(() => {
    const place = field.current;
    if (place === null) return;
    place.focus();
    if (place.value.length > 1) place.select();
  }, []);
  return (
    <>
      <input
        ref={field}
        className="hl-par-field"
        aria-label={`${label}: a number or a formula; Enter sets it`}
        aria-invalid={fault === "" ? undefined : true}
        aria-describedby={fault === "" ? undefined : description}
        data-parameter={name}
        value={source}
        size={Math.max(5, source.length)}
        autoComplete="off"
        autoCapitalize="off"
        spellCheck={false}
        onChange={(event) => {
          setSource(event.target.value);
          onWrite();
        }}
        onBlur={onLeave}
        onKeyDown={(event) => {
          if (event.key === "Enter" && source.trim() !== "") onEnter(source.trim());
          else if (event.key === "Escape" || event.key === "Enter") onEscape();
          else return;
          event.preventDefault();
          event.stopPropagation();
        }}
      />
      {fault === "" ? null : (
        <span id={description} className="hl-said">
          {fault}
        </span>
      )}
    </>
  );
}
