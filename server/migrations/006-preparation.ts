import { ENTRY, index, ref, sqlStep } from './support';

/** What preparation, the day and the hand-over keep: the tables stand before their screens, so that later work only adds. */
export const { up, down } = sqlStep(
  `
create table takes (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  ${ref('song_id', 'songs', 'not null')},
  ${ref('part_id', 'parts')},
  ${ref('pass_id', 'passes')},
  number integer not null check (number >= 1),
  started_at wall_time not null,
  seconds integer check (seconds >= 0),
  ending text not null check (ending in ('complete', 'false start', 'incomplete')),
  mark text check (mark in ('master', 'keep', 'no')),
  approved_by uuid references users,
  comment text,
  file_name text,
  created_at timestamptz not null default now()
);
create unique index takes_number_index on takes (song_id, coalesce(part_id, '00000000-0000-0000-0000-000000000000'), number);

create table checklists (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  title text not null check (title ~ '\\S'),
  position integer not null check (position >= 0),
  created_at timestamptz not null default now(),
  unique (production_id, id)
);
create table checklist_items (${ENTRY}, ${ref('checklist_id', 'checklists', 'not null', 'cascade')}, ${ref('owner_person_id', 'people')},
  says text not null check (says ~ '\\S'),
  due wall_date,
  proof text,
  done_at timestamptz,
  unique (checklist_id, position));

create table questions (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  ${ref('person_id', 'people')},
  asks text not null check (asks ~ '\\S'),
  due wall_date,
  created_at timestamptz not null default now(),
  unique (production_id, id)
);
create table answers (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  ${ref('question_id', 'questions', 'not null', 'cascade')},
  ${ref('person_id', 'people', 'not null')},
  says text not null,
  at timestamptz not null default now(),
  unique (question_id, person_id)
);

create table attachments (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  resource text not null,
  resource_id uuid not null,
  file_name text not null check (file_name ~ '\\S'),
  media_type text not null,
  bytes bigint not null check (bytes >= 0),
  sha256 text not null check (sha256 ~ '^[0-9a-f]{64}$'),
  content bytea,
  stored_at text,
  uploaded_by uuid not null references users,
  created_at timestamptz not null default now(),
  check (num_nonnulls(content, stored_at) = 1)
);

${index('takes', 'production_id', 'part_id', 'pass_id', 'approved_by')}
${index('checklists', 'production_id')}
${index('checklist_items', 'production_id', 'owner_person_id')}
${index('questions', 'person_id')}
${index('answers', 'production_id', 'person_id')}
${index('attachments', 'production_id', 'resource_id', 'uploaded_by')}
`,
  `drop table attachments, answers, questions, checklist_items, checklists, takes;`,
);
