import { CommandLink, RunningHead } from "../../ui/index.ts";

interface Words {
  readonly name: string;
  readonly message: string;
}

const WORDS: Readonly<Record<number, Words>> = {
  400: {
    name: "Not understood",
    message: "The page sent something that cannot be read. Open it again and try once more.",
  },
  401: { name: "Not signed in", message: "You are not signed in. Sign in and try again." },
  403: { name: "Not open to you", message: "That may only be done by others on this paper." },
  404: { name: "Nothing here", message: "There is no page at this address." },
};

const FAILED: Words = {
  name: "Something failed here",
  message: "The page could not be made. What you wrote is kept. Try again in a moment.",
};

/** A page that could not be shown: what is wrong, and where to go. `title` and `meta` are React 19's hoisted tags. */
export function FaultPage({
  status,
  message,
  detail,
}: {
  readonly status: number;
  /** The words that came with the refusal. */
  readonly message: string | null;
  /** The stack, while developing. */
  readonly detail: string | null;
}) {
  const words = WORDS[status] ?? FAILED;
  return (
    <>
      <title>{`${words.name} · Halfline`}</title>
      <RunningHead home="/" />
      <main className="px-[var(--margin)] pt-24 pb-16 w-full max-w-[740px] mx-auto">
        <h1 className="text-[38px] leading-[44px] mb-4">{words.name}</h1>
        <p className="mb-8 text-ink-2">{message ?? words.message}</p>
        <p className="flex flex-wrap gap-x-7 gap-y-2">
          <CommandLink to="/shelf">To the shelf</CommandLink>
          <CommandLink to="/">To the first page</CommandLink>
          <CommandLink to="/specimen">Open the specimen paper</CommandLink>
        </p>
        {detail ? (
          <pre className="mt-10 overflow-auto font-mono text-[12.5px] leading-5 text-ink-2">{detail}</pre>
        ) : null}
      </main>
    </>
  );
}
