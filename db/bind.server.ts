import type { Knex } from "knex";

type Query = (knex: Knex, ...args: never[]) => unknown;

/** An aggregate's functions, with the connection already given. */
export type Bound<Aggregate> = {
  readonly [Name in keyof Aggregate]: Aggregate[Name] extends (knex: Knex, ...args: infer Args) => infer Answer
    ? (...args: Args) => Answer
    : never;
};

/** Gives `knex` as the first argument to every function of an aggregate. */
export function bind<Aggregate extends Readonly<Record<string, Query>>>(
  knex: Knex,
  aggregate: Aggregate,
): Bound<Aggregate> {
  const bound = Object.entries(aggregate).map(([name, query]) => [name, query.bind(null, knex)]);
  return Object.fromEntries(bound) as Bound<Aggregate>;
}
