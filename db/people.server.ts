import type { Knex } from "knex";

export interface PersonRow {
  readonly id: string;
  readonly name: string;
  readonly email: string | null;
}

/** Who somebody is at a provider of sign-in. */
export interface Identity {
  readonly provider: string;
  /** The provider's own number for the account: stays when the login changes. */
  readonly subject: string;
  readonly login: string;
  readonly name: string;
  readonly email: string | null;
}

const PERSON = ["people.id", "people.name", "people.email"];

/**
 * The person of an identity; a new one when the identity is seen for the first time.
 * Login and e-mail follow the provider, the name stays as the person set it here.
 */
export async function signIn(knex: Knex, identity: Identity): Promise<PersonRow> {
  return knex.transaction(async (trx) => {
    // Two first sign-ins at the same moment would make two people.
    await trx.raw("select pg_advisory_xact_lock(hashtext(?))", [`${identity.provider}:${identity.subject}`]);
    const { provider, subject, login, email } = identity;

    // A login freed by one account and taken by another must not lead to the first.
    await trx("identities")
      .where({ provider })
      .whereRaw("lower(login) = lower(?)", [login])
      .whereNot({ subject })
      .update({ login: "" });

    const known = await trx("identities").where({ provider, subject }).first("person_id");
    if (known) {
      await trx("identities").where({ provider, subject }).update({ login });
      const [person] = await trx("people").where({ id: known.person_id }).update({ email }, PERSON);
      return person as PersonRow;
    }
    const [person] = await trx("people").insert({ name: identity.name, email }, PERSON);
    await trx("identities").insert({ provider, subject, login, person_id: person.id });
    return person as PersonRow;
  });
}

/** Finds a person by the login they last signed in with, in any case of letters. */
export async function findByLogin(knex: Knex, provider: string, login: string): Promise<PersonRow | undefined> {
  return knex("people")
    .join("identities", "identities.person_id", "people.id")
    .where("identities.provider", provider)
    .whereRaw("lower(identities.login) = lower(?)", [login])
    .first(PERSON);
}

/** Changes the name that coauthors see. */
export async function rename(knex: Knex, personId: string, name: string): Promise<void> {
  await knex("people").where({ id: personId }).update({ name });
}
