import type { ButtonHTMLAttributes } from "react";
import { Link, type LinkProps } from "react-router";

/** A command: an underlined word. */
export function Command({ className = "", type = "button", ...rest }: ButtonHTMLAttributes<HTMLButtonElement>) {
  return <button {...rest} type={type} className={`command ${className}`} />;
}

/** A command that leads to another place. */
export function CommandLink({ className = "", ...rest }: LinkProps) {
  return <Link {...rest} className={`command ${className}`} />;
}

/** The one thing a page is for; a page has one, or none. */
export function Button({
  outlined = false,
  className = "",
  type = "submit",
  ...rest
}: ButtonHTMLAttributes<HTMLButtonElement> & { readonly outlined?: boolean }) {
  return <button {...rest} type={type} className={`button ${outlined ? "button-outlined" : ""} ${className}`} />;
}
