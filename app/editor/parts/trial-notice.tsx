import { Command, CommandLink } from "../../ui/index.ts";
import type { Desk } from "../live/desk.ts";

interface Props {
  readonly desk: Desk;
  /** Where a visitor may sign in; "" for one who is signed in. */
  readonly signIn: string;
  /** A parameter has another value than the paper's. */
  readonly tried: boolean;
}

/** For one who reads: parameters may be tried on this page, and nothing of it is kept. */
export function TrialNotice({ desk, signIn, tried }: Props) {
  return (
    <p className="hl-trial">
      Move the parameters as you like: everything follows on this page, and nothing is kept.
      {tried ? (
        <>
          {" "}
          <Command className="hl-small" onClick={() => desk.putBackAll()}>
            Put the paper’s values back
          </Command>
        </>
      ) : null}
      {signIn === "" ? null : (
        <>
          {" "}
          <CommandLink className="hl-small" to={signIn}>
            Sign in to write your own
          </CommandLink>
        </>
      )}
    </p>
  );
}
