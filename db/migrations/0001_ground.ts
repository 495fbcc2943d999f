import type { Knex } from "knex";

/** People, papers, the updates of their texts, and results. The start of everything. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable("people", (t) => {
    t.uuid("id").primary().defaultTo(knex.fn.uuid());
    t.text("name").notNullable();
    t.text("email");
    t.timestamp("created_at").notNullable().defaultTo(knex.fn.now());
  });

  await knex.schema.createTable("identities", (t) => {
    t.text("provider").notNullable();
    t.text("subject").notNullable();
    t.uuid("person_id").notNullable().references("people.id").onDelete("CASCADE");
    t.text("login").notNullable();
    t.primary(["provider", "subject"]);
    t.index(["person_id"]);
    t.index(["provider", "login"]);
  });

  await knex.schema.createTable("sessions", (t) => {
    // Only the SHA-256 of the cookie's secret is kept: a copy of this table opens no session.
    t.text("id_hash").primary();
    t.uuid("person_id").notNullable().references("people.id").onDelete("CASCADE");
    t.timestamp("created_at").notNullable().defaultTo(knex.fn.now());
    t.timestamp("last_seen_at").notNullable().defaultTo(knex.fn.now());
    t.timestamp("expires_at").notNullable();
    t.index(["person_id"]);
    t.index(["expires_at"]);
  });

  await knex.schema.createTable("papers", (t) => {
    t.text("id").primary();
    // Title and authors are read off the text whenever it changes, so that the shelf need not read every text.
    t.text("title").notNullable().defaultTo("");
    t.text("authors").notNullable().defaultTo("");
    t.boolean("specimen").notNullable().defaultTo(false);
    t.timestamp("created_at").notNullable().defaultTo(knex.fn.now());
    t.timestamp("changed_at").notNullable().defaultTo(knex.fn.now());
  });

  await knex.schema.createTable("members", (t) => {
    t.text("paper_id").notNullable().references("papers.id").onDelete("CASCADE");
    t.uuid("person_id").notNullable().references("people.id").onDelete("CASCADE");
    t.text("role").notNullable().checkIn(["owner", "author", "referee", "reader"], "members_role");
    // Each person puts a paper by for themselves.
    t.timestamp("put_by_at");
    t.timestamp("added_at").notNullable().defaultTo(knex.fn.now());
    t.primary(["paper_id", "person_id"]);
    t.index(["person_id"]);
  });

  await knex.schema.createTable("paper_updates", (t) => {
    t.bigIncrements("id");
    t.text("paper_id").notNullable().references("papers.id").onDelete("CASCADE");
    t.text("doc").notNullable().checkIn(["text", "shown"], "paper_updates_doc");
    t.binary("update").notNullable();
    // Null: the server itself wrote it.
    t.uuid("person_id").references("people.id").onDelete("SET NULL");
    t.timestamp("created_at").notNullable().defaultTo(knex.fn.now());
    t.index(["paper_id", "doc", "id"]);
  });

  await knex.schema.createTable("paper_snapshots", (t) => {
    t.text("paper_id").notNullable().references("papers.id").onDelete("CASCADE");
    t.text("doc").notNullable().checkIn(["text", "shown"], "paper_snapshots_doc");
    t.binary("state").notNullable();
    // The last update folded in: the text is this state and every update with a greater id.
    t.bigInteger("upto").notNullable();
    t.timestamp("created_at").notNullable().defaultTo(knex.fn.now());
    t.primary(["paper_id", "doc"]);
  });

  await knex.schema.createTable("results", (t) => {
    t.text("key").primary();
    t.text("kind").notNullable();
    t.text("solver").notNullable();
    // json, not jsonb: the order of a result's values is part of it, and long lists of numbers are read faster.
    t.json("result").notNullable();
    t.double("seconds").notNullable();
    t.timestamp("created_at").notNullable().defaultTo(knex.fn.now());
  });

  // Results are global by key, but reached only through a paper that the asker may see.
  await knex.schema.createTable("paper_results", (t) => {
    t.text("paper_id").notNullable().references("papers.id").onDelete("CASCADE");
    t.text("key").notNullable().references("results.key").onDelete("CASCADE");
    t.uuid("person_id").references("people.id").onDelete("SET NULL");
    t.timestamp("at").notNullable().defaultTo(knex.fn.now());
    t.primary(["paper_id", "key"]);
  });

  await knex.schema.createTable("computations", (t) => {
    t.bigIncrements("id");
    t.text("paper_id").notNullable().references("papers.id").onDelete("CASCADE");
    t.uuid("person_id").references("people.id").onDelete("SET NULL");
    t.specificType("cells", "text[]").notNullable();
    t.timestamp("begun_at").notNullable().defaultTo(knex.fn.now());
    t.double("seconds").notNullable().defaultTo(0);
    t.timestamp("ended_at");
    t.index(["person_id", "begun_at"]);
  });
}

export async function down(knex: Knex): Promise<void> {
  for (const table of [
    "computations",
    "paper_results",
    "results",
    "paper_snapshots",
    "paper_updates",
    "members",
    "papers",
    "sessions",
    "identities",
    "people",
  ]) {
    await knex.schema.dropTable(table);
  }
}
