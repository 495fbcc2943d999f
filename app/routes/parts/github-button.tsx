import { Button } from "../../ui/index.ts";

/** Begins the sign-in. A whole-page form: it leads to another site. */
export function GithubButton({ returnTo }: { readonly returnTo: string }) {
  return (
    <form method="post" action="/sign-in/github">
      <input type="hidden" name="returnTo" value={returnTo} />
      <Button>Sign in with GitHub</Button>
    </form>
  );
}
