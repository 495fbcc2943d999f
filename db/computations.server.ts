import type { Knex } from "knex";

/** What a person asked for that takes long and has not ended: `work` is not looked into here. */
export interface UnfinishedWork {
  readonly id: number;
  readonly paperId: string;
  readonly personId: string;
  readonly personName: string;
  readonly begunAt: Date;
  readonly work: unknown;
  /** How often a process has begun it. */
  readonly begunTimes: number;
}

/** The number of the next record: to be claimed before there is a record that others could see unclaimed. */
export async function nextNumber(knex: Knex): Promise<number> {
  const { rows }: { rows: { id: string }[] } = await knex.raw(
    "select nextval(pg_get_serial_sequence('computations', 'id')) as id",
  );
  return Number(rows[0]?.id);
}

/** What is recorded of a computation that a person asked for. */
export interface NewComputation {
  readonly id: number;
  readonly paperId: string;
  readonly personId: string;
  readonly cells: readonly string[];
  /** What another process needs to take it up again; null: it need not. */
  readonly work: unknown;
}

/** Opens the record of a computation under a number of `nextNumber`. */
export async function open(knex: Knex, { id, paperId, personId, cells, work }: NewComputation): Promise<void> {
  await knex("computations").insert({
    id,
    paper_id: paperId,
    person_id: personId,
    cells,
    work: work === null ? null : JSON.stringify(work),
  });
}

/** Adds the solver seconds that a cell took. */
export async function addSeconds(knex: Knex, id: number, seconds: number): Promise<void> {
  await knex("computations").where({ id }).increment("seconds", seconds);
}

/** Notes that nothing of the computation is under way any more. */
export async function close(knex: Knex, id: number): Promise<void> {
  await knex("computations").where({ id }).update({ ended_at: knex.fn.now(), work: null });
}

/** Ids of computations that may be taken up again, oldest first. */
export async function unfinished(knex: Knex): Promise<number[]> {
  const rows: { id: string }[] = await knex("computations")
    .whereNull("ended_at")
    .whereNotNull("work")
    .orderBy("id")
    .select("id");
  return rows.map(({ id }) => Number(id));
}

/** Takes one up again, counting that; null when it has ended meanwhile, or the person who asked is gone. */
export async function takeUp(knex: Knex, id: number): Promise<UnfinishedWork | null> {
  const rows: { paper_id: string; person_id: string | null; begun_at: Date; work: unknown; begun_times: number }[] =
    await knex("computations")
      .where({ id })
      .whereNull("ended_at")
      .whereNotNull("work")
      .increment("begun_times", 1)
      .returning(["paper_id", "person_id", "begun_at", "work", "begun_times"]);
  const [row] = rows;
  if (!row?.person_id) return null;
  const person: { name: string } | undefined = await knex("people").where({ id: row.person_id }).first("name");
  if (!person) return null;
  return {
    id,
    paperId: row.paper_id,
    personId: row.person_id,
    personName: person.name,
    begunAt: row.begun_at,
    work: row.work,
    begunTimes: row.begun_times,
  };
}

/** Solver seconds of a person's computations begun since `since`, oldest first. */
export async function secondsSince(
  knex: Knex,
  personId: string,
  since: Date,
): Promise<{ begunAt: Date; seconds: number }[]> {
  const rows: { begun_at: Date; seconds: number }[] = await knex("computations")
    .where({ person_id: personId })
    .where("begun_at", ">", since)
    .where("seconds", ">", 0)
    .orderBy("begun_at")
    .select("begun_at", "seconds");
  return rows.map((row) => ({ begunAt: row.begun_at, seconds: row.seconds }));
}
