import { sqlStep } from './support';

/** The order of changes within their batch: without it, two changes of one row at one revision cannot be told apart or undone. */
export const { up, down } = sqlStep(
  `alter table history add column ordinal integer not null default 0 check (ordinal >= 0);`,
  `alter table history drop column ordinal;`,
);
