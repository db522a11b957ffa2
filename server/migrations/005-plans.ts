import { index, ref, sqlStep } from './support';

/** Drafts, published versions and their calls are frozen by triggers; they go only with their whole production. */
export const { up, down } = sqlStep(
  `
create table plans (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  input_revision integer not null check (input_revision >= 0),
  seed bigint not null check (seed >= 0),
  iterations bigint not null check (iterations >= 0),
  status text not null check (status in ('optimal', 'feasible', 'impossible', 'unsolved')),
  cost double precision,
  bound double precision,
  outcome json not null,
  file json not null,
  created_by uuid not null references users,
  created_at timestamptz not null default now(),
  unique (production_id, id),
  check ((cost is null) = (status in ('impossible', 'unsolved'))),
  check ((bound is null) = (cost is null))
);

create table versions (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  number integer not null check (number >= 1),
  ${ref('plan_id', 'plans', 'not null')},
  file_revision integer not null check (file_revision >= 0),
  file json not null,
  changes json not null,
  note text,
  published_by uuid not null references users,
  by_name text not null,
  published_at timestamptz not null,
  unique (production_id, number),
  unique (production_id, id),
  unique (plan_id)
);

-- One uid per person and date through all versions; the sequence grows when times or status change.
create table calls (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  ${ref('version_id', 'versions', 'not null', 'cascade')},
  ${ref('person_id', 'people', 'not null')},
  date wall_date not null,
  arrive wall_time not null,
  ready wall_time not null,
  release wall_time not null,
  working double precision not null check (working >= 0),
  waiting double precision not null check (waiting >= 0),
  uid uuid not null,
  sequence integer not null check (sequence >= 0),
  status text not null check (status in ('called', 'cancelled')),
  changed_at timestamptz not null,
  unique (production_id, id),
  unique (version_id, person_id, date),
  unique (version_id, uid),
  check (arrive <= ready)
);

create table confirmations (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  ${ref('call_id', 'calls', 'not null', 'cascade')},
  answer text not null check (answer in ('confirmed', 'declined')),
  note text,
  at timestamptz not null default now(),
  unique (call_id)
);

create function refuse_change() returns trigger language plpgsql as $$
begin
  if tg_op = 'DELETE' and not exists (select 1 from productions where id = old.production_id) then
    return old;
  end if;
  raise exception '% is immutable', tg_table_name using errcode = 'restrict_violation';
end $$;
create trigger plans_are_immutable before update on plans for each row execute function refuse_change();
create trigger versions_are_immutable before update or delete on versions for each row execute function refuse_change();
create trigger calls_are_immutable before update or delete on calls for each row execute function refuse_change();

${index('plans', 'production_id, created_at', 'created_by')}
${index('versions', 'published_by')}
${index('calls', 'production_id', 'person_id')}
${index('confirmations', 'production_id')}
`,
  `drop table confirmations, calls, versions, plans; drop function refuse_change();`,
);
