import { Form } from "react-router";
import { Button, Choice, Command, CommandLink, Field } from "../../ui/index.ts";
import type { PeopleFault } from "./people.server.ts";
import type { PeopleGroup } from "./people-groups.ts";

const ROLES = [
  ["author", "Author: writes and computes"],
  ["referee", "Referee: reads"],
  ["reader", "Reader: reads"],
  ["owner", "Owner: an author who also adds and removes people"],
] as const;

interface People {
  readonly groups: readonly PeopleGroup[];
  readonly you: string;
  /** May add, change and remove. */
  readonly owns: boolean;
  /** Id of the member whose role is being changed. */
  readonly changing: string | null;
  readonly fault: PeopleFault;
}

/** Who may do what on a paper, under the headings of its front matter. */
export function PeopleList({ groups, you, owns, changing, fault }: People) {
  return (
    <section className="people" aria-label="Who may do what">
      {owns ? <AddForm fault={fault?.at === "login" ? fault.message : null} /> : null}
      {fault?.at === "member" ? (
        <p className="field-fault" role="alert">
          {fault.message}
        </p>
      ) : null}
      {groups.map(({ name, may, members }) =>
        members.length > 0 ? (
          <section key={name}>
            <h2 className="people-group">
              {name} <span>{may}</span>
            </h2>
            <ul>
              {members.map((member) => (
                <li key={member.personId} className="people-row">
                  <span>
                    <b>{member.name}</b>
                    <span className="people-login">{member.personId === you ? "you" : member.login}</span>
                  </span>
                  <span className="people-state">
                    {member.role === "owner" ? "Owner, may also add and remove people" : null}
                  </span>
                  <span className="people-command">
                    {owns && changing !== member.personId ? (
                      <CommandLink to={`?change=${member.personId}`} preventScrollReset>
                        Change role
                      </CommandLink>
                    ) : null}
                    {!owns && member.personId === you ? <LeaveForm /> : null}
                  </span>
                  {owns && changing === member.personId ? (
                    <ChangeForm member={member.personId} role={member.role} name={member.name} />
                  ) : null}
                </li>
              ))}
            </ul>
          </section>
        ) : null,
      )}
      <p className="field-hint">Taking someone off keeps what they wrote, under their name.</p>
    </section>
  );
}

function AddForm({ fault }: { readonly fault: string | null }) {
  return (
    <Form method="post" className="people-add">
      <Field label="Add by the name they sign in with on GitHub" name="login" autoComplete="off" fault={fault} />
      <Choice label="as" name="role" defaultValue="author">
        {ROLES.map(([role, words]) => (
          <option key={role} value={role}>
            {words}
          </option>
        ))}
      </Choice>
      <Button name="intent" value="add">
        Add
      </Button>
    </Form>
  );
}

function ChangeForm({ member, role, name }: { readonly member: string; readonly role: string; readonly name: string }) {
  return (
    <Form method="post" className="people-change">
      <input type="hidden" name="member" value={member} />
      <Choice label={`Role of ${name}`} name="role" defaultValue={role}>
        {ROLES.map(([value, words]) => (
          <option key={value} value={value}>
            {words}
          </option>
        ))}
      </Choice>
      <div className="people-commands">
        <Button name="intent" value="change" outlined>
          Change role
        </Button>
        <Command type="submit" name="intent" value="remove">
          Take off the paper
        </Command>
        <CommandLink to="?" preventScrollReset>
          Leave as it is
        </CommandLink>
      </div>
    </Form>
  );
}

function LeaveForm() {
  return (
    <Form method="post">
      <Command type="submit" name="intent" value="leave">
        Take me off this paper
      </Command>
    </Form>
  );
}
