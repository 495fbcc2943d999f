import { Form, useNavigate } from "react-router";
import { Button, CommandLink, Dialog, Field } from "../../ui/index.ts";

/** Asks for the paper's title before it is deleted for ever. */
export function DeleteDialog({
  paper,
  fault,
}: {
  readonly paper: { readonly id: string; readonly title: string };
  readonly fault: string | null;
}) {
  const navigate = useNavigate();
  const leave = () => navigate("/shelf", { preventScrollReset: true });
  return (
    <Dialog title="Delete for ever" onClose={leave}>
      <p className="mb-5 text-ink-2">
        The text of <em>{paper.title}</em>, its results and its record go, for you and for everybody on it. Nothing
        brings them back.
      </p>
      <Form method="post">
        <input type="hidden" name="paper" value={paper.id} />
        <Field label="Write the title, to be sure" name="title" autoComplete="off" fault={fault} required />
        <p className="mt-6 flex flex-wrap items-center gap-7">
          <Button name="intent" value="delete">
            Delete for ever
          </Button>
          <CommandLink to="/shelf" preventScrollReset>
            Keep it
          </CommandLink>
        </p>
      </Form>
    </Dialog>
  );
}
