import { Command, CommandLink } from "../../ui/index.ts";
import { closingOf } from "../live/connection.ts";

interface Props {
  readonly code: number;
  onAgain(): void;
}

/** Why the sheet is no longer live, and the way out. The text stays readable beneath. */
export function ClosedNotice({ code, onAgain }: Props) {
  const { words, way } = closingOf(code);
  return (
    <div className="hl-notice" role="alert">
      <b aria-hidden="true">‡ </b>
      {words}{" "}
      {way.to === "again" || way.to === "reload" ? (
        <Command onClick={way.to === "again" ? onAgain : () => window.location.reload()}>{way.label}</Command>
      ) : (
        <CommandLink
          to={way.to === "shelf" ? "/shelf" : `/sign-in?returnTo=${encodeURIComponent(window.location.pathname)}`}
        >
          {way.label}
        </CommandLink>
      )}
    </div>
  );
}
