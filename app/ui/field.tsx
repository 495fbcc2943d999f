import { type InputHTMLAttributes, type ReactNode, type SelectHTMLAttributes, useId } from "react";

interface Around {
  readonly label: string;
  /** A line beneath, always there. */
  readonly hint?: ReactNode;
  /** What is wrong with the value, and what would do. */
  readonly fault?: string | null | undefined;
}

/** A line to write on, with its label above. */
export function Field({ label, hint, fault, ...rest }: InputHTMLAttributes<HTMLInputElement> & Around) {
  const id = useId();
  return (
    <FieldFrame id={id} label={label} hint={hint} fault={fault}>
      <input {...rest} {...described(id, hint, fault)} className={`field-input ${rest.className ?? ""}`} />
    </FieldFrame>
  );
}

/** A choice among few, with its label above. */
export function Choice({ label, hint, fault, ...rest }: SelectHTMLAttributes<HTMLSelectElement> & Around) {
  const id = useId();
  return (
    <FieldFrame id={id} label={label} hint={hint} fault={fault}>
      <div className="field-choice">
        <select {...rest} {...described(id, hint, fault)} className={`field-input ${rest.className ?? ""}`} />
      </div>
    </FieldFrame>
  );
}

function FieldFrame({
  id,
  label,
  hint,
  fault,
  children,
}: Around & { readonly id: string; readonly children: ReactNode }) {
  return (
    <div>
      <label className="field-label" htmlFor={id}>
        {label}
      </label>
      {children}
      {hint ? (
        <p className="field-hint" id={`${id}-hint`}>
          {hint}
        </p>
      ) : null}
      {fault ? (
        <p className="field-fault" id={`${id}-fault`} role="alert">
          {fault}
        </p>
      ) : null}
    </div>
  );
}

function described(id: string, hint: ReactNode, fault: string | null | undefined) {
  const words = [hint ? `${id}-hint` : "", fault ? `${id}-fault` : ""].filter((word) => word !== "");
  return {
    id,
    "aria-invalid": fault ? true : undefined,
    "aria-describedby": words.length > 0 ? words.join(" ") : undefined,
  };
}
