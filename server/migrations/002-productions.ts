import { index, sqlStep } from './support';

export const { up, down } = sqlStep(
  `
create table productions (
  id uuid primary key default gen_random_uuid(),
  created_by uuid not null references users,
  revision integer not null default 0 check (revision >= 0),
  head_revision integer not null default 0 check (head_revision >= 0),
  code text not null check (code ~ '\\S'),
  title text not null check (title ~ '\\S'),
  timezone text not null check (timezone ~ '^[A-Za-z]'),
  currency text check (currency ~ '^[A-Z]{3}$'),
  pitch amount check (pitch > 0),
  recording_rate integer check (recording_rate > 0),
  recording_bits integer check (recording_bits > 0),
  paper text check (paper in ('A4', 'Letter')),
  place_name text,
  place_address text,
  place_door text,
  place_parking text,
  place_phone text,
  late text,
  dress text,
  note text,
  rules_step integer check (rules_step >= 1),
  rules_meal_after integer check (rules_meal_after >= 0),
  rules_meal integer check (rules_meal >= 0),
  rules_break_after integer check (rules_break_after >= 0),
  rules_break integer check (rules_break >= 0),
  rules_wrap integer check (rules_wrap >= 0),
  rules_listen integer check (rules_listen >= 0),
  rules_reserve amount,
  rules_turnaround integer check (rules_turnaround >= 0),
  rules_changeover integer check (rules_changeover >= 0),
  rules_one_room_per_song boolean,
  weights_waiting amount,
  weights_changeover amount,
  weights_day amount,
  weights_overtime amount,
  weights_call amount,
  weights_maybe amount,
  weights_should amount,
  weights_nice amount,
  passes_by_hand boolean,
  given_empty text[] not null default '{}',
  extra json,
  created_at timestamptz not null default now(),
  updated_at timestamptz not null default now()
);
${index('productions', 'created_by')}

create table members (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  user_id uuid not null references users on delete cascade,
  role text not null check (role in ('producer', 'engineer', 'assistant', 'musician', 'guest')),
  person_id uuid,
  created_at timestamptz not null default now(),
  updated_at timestamptz not null default now(),
  unique (production_id, user_id)
);
${index('members', 'user_id', 'person_id')}

create table invitations (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  email text not null check (email = lower(email)),
  role text not null check (role in ('producer', 'engineer', 'assistant', 'musician', 'guest')),
  person_id uuid,
  token_hash text not null unique check (token_hash ~ '^[0-9a-f]{64}$'),
  invited_by uuid not null references users,
  created_at timestamptz not null default now(),
  expires_at timestamptz not null check (expires_at > created_at),
  accepted_at timestamptz,
  unique (production_id, email)
);
${index('invitations', 'invited_by', 'person_id')}

-- Of a link only the SHA-256 of its token is kept: who reads the database cannot open the link.
create table links (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  kind text not null check (kind in ('calendar', 'guest')),
  person_id uuid,
  token_hash text not null unique check (token_hash ~ '^[0-9a-f]{64}$'),
  created_by uuid not null references users,
  created_at timestamptz not null default now(),
  revoked_at timestamptz,
  last_used_at timestamptz,
  check ((kind = 'calendar') = (person_id is not null))
);
${index('links', 'production_id', 'person_id', 'created_by')}

-- A change id is applied once per production, whoever sends it again.
create table history (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  change_id uuid not null,
  revision integer not null check (revision > 0),
  base integer check (base >= 0),
  user_id uuid not null references users,
  by_name text not null,
  at timestamptz not null,
  resource text not null,
  key text not null,
  op text not null check (op in ('create', 'update', 'remove', 'restore')),
  before json,
  after json,
  unique (production_id, change_id)
);
${index('history', 'production_id, revision', 'production_id, resource, key, revision', 'user_id')}

create table starting_points (
  slug text primary key check (slug ~ '^[a-z0-9][a-z0-9-]*$'),
  hash text not null check (hash ~ '^[0-9a-f]{64}$'),
  title text not null,
  summary text not null,
  songs integer not null check (songs >= 0),
  people integer not null check (people >= 0),
  days integer not null check (days >= 0),
  source text not null,
  position integer not null check (position >= 0),
  updated_at timestamptz not null default now()
);
`,
  `drop table starting_points; drop table history; drop table links; drop table invitations; drop table members; drop table productions;`,
);
