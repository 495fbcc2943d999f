import type { Knex } from "knex";

/** Widen: parts of computations under way, and what was asked for, so that long work outlives the process that began it. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable("result_parts", (t) => {
    // The key of a result that is not whole yet; none is kept once it is.
    t.text("key").notNullable();
    t.integer("index").notNullable();
    t.json("part").notNullable();
    t.double("seconds").notNullable();
    t.timestamp("created_at").notNullable().defaultTo(knex.fn.now());
    t.primary(["key", "index"]);
    t.index(["created_at"]);
  });
  await knex.schema.alterTable("computations", (t) => {
    // The planned cells, where some take long; null: not taken up again when the process that began it ends.
    t.json("work");
    t.integer("begun_times").notNullable().defaultTo(1);
  });
  await knex.raw(
    "create index computations_unfinished on computations (id) where ended_at is null and work is not null",
  );
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw("drop index computations_unfinished");
  await knex.schema.alterTable("computations", (t) => {
    t.dropColumns("work", "begun_times");
  });
  await knex.schema.dropTable("result_parts");
}
