import { index, sqlStep } from './support';

/**
 * Wall-clock times are text in the form of the file, checked by a domain: they come back as the same characters whatever the zone of
 * server and driver, they sort and compare in the order of time, and the database still refuses a date that does not exist.
 */
export const { up, down } = sqlStep(
  `
create domain wall_date as text collate "C" check (
  value is null or case when value ~ '^[0-9]{4}-[0-9]{2}-[0-9]{2}$'
    then make_date(substr(value, 1, 4)::int, substr(value, 6, 2)::int, substr(value, 9, 2)::int) is not null
    else false end);
create domain wall_time as text collate "C" check (
  value is null or case when value ~ '^[0-9]{4}-[0-9]{2}-[0-9]{2}T([01][0-9]|2[0-3]):[0-5][0-9]$'
    then make_date(substr(value, 1, 4)::int, substr(value, 6, 2)::int, substr(value, 9, 2)::int) is not null
    else false end);
create domain resource_key as text collate "C" check (value ~ '^[a-z0-9][a-z0-9-]{0,63}$');
create domain amount as double precision check (value >= 0 and value < 'infinity');

create table users (
  id uuid primary key default gen_random_uuid(),
  email text,
  name text not null,
  password_hash text,
  created_at timestamptz not null default now(),
  updated_at timestamptz not null default now(),
  check ((email is null) = (password_hash is null)),
  check (email = lower(email))
);
create unique index users_email_index on users (email);

create table sessions (
  id uuid primary key default gen_random_uuid(),
  user_id uuid not null references users on delete cascade,
  created_at timestamptz not null default now(),
  expires_at timestamptz not null,
  ended_at timestamptz,
  check (expires_at > created_at)
);
${index('sessions', 'user_id', 'expires_at')}
`,
  `drop table sessions; drop table users; drop domain amount; drop domain resource_key; drop domain wall_time; drop domain wall_date;`,
);
