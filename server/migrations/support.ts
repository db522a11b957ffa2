import type { QueryInterface } from 'sequelize';

/** A step of the database's life in plain SQL: constraints, domains and triggers read best in the database's own language. */
export interface Step {
  up: (given: { context: QueryInterface }) => Promise<void>;
  down: (given: { context: QueryInterface }) => Promise<void>;
}

export function sqlStep(up: string, down: string): Step {
  const run =
    (sql: string) =>
    async ({ context }: { context: QueryInterface }) => {
      await context.sequelize.transaction(async (transaction) => {
        await context.sequelize.query(sql, { transaction });
      });
    };
  return { up: run(up), down: run(down) };
}

/** Columns that every row of a production has; unknown fields are `json`, which keeps them as they were written. */
export const ROW = `
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  key resource_key not null,
  position integer not null check (position >= 0),
  revision integer not null check (revision >= 0),
  removed_at timestamptz,
  given_empty text[] not null default '{}',
  extra json,
  unique (production_id, id)`;

/** A reference to a row of the same production: the production is part of the foreign key, so that none reaches across. */
export const ref = (column: string, table: string, need: 'null' | 'not null' = 'null', onDelete = 'no action') => `
  ${column} uuid ${need},
  foreign key (production_id, ${column}) references ${table} (production_id, id) on delete ${onDelete}`;

/** Columns of an entry of a list that belongs to a row. */
export const ENTRY = `
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  position integer not null check (position >= 0)`;

/** Three minutes: all or none, in order, and the form in which they were written. */
export const MINUTES_COLUMNS = `
  minutes_low integer check (minutes_low > 0),
  minutes_likely integer,
  minutes_high integer,
  minutes_form text check (minutes_form in ('one', 'single', 'three')),
  check (num_nonnulls(minutes_low, minutes_likely, minutes_high, minutes_form) in (0, 4)),
  check (minutes_low <= minutes_likely and minutes_likely <= minutes_high)`;

export const PRIORITY = `priority text check (priority in ('must', 'should', 'nice'))`;

export const index = (table: string, ...columns: string[]) =>
  columns.map((column) => `create index ${table}_${column.replaceAll(/\W+/g, '_')}_index on ${table} (${column});`).join('\n');
