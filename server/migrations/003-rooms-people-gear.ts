import { ENTRY, index, ref, ROW, sqlStep } from './support';

const SPAN = `from_wall wall_time not null, to_wall wall_time not null, check (from_wall < to_wall)`;

export const { up, down } = sqlStep(
  `
create table rooms (${ROW}, unique (production_id, key),
  name text,
  size_length amount check (size_length > 0),
  size_width amount check (size_width > 0),
  size_height amount check (size_height > 0),
  people_limit integer check (people_limit >= 1),
  inputs integer check (inputs >= 0),
  phones integer check (phones >= 0),
  standing boolean,
  standard integer check (standard >= 0),
  price_day amount,
  price_overtime_hour amount,
  note text,
  check (num_nonnulls(size_length, size_width, size_height) in (0, 3))
);

create table people (${ROW}, unique (production_id, key),
  name text,
  short text,
  plays text[],
  crew boolean,
  limits_voice integer check (limits_voice >= 0),
  limits_day integer check (limits_day >= 0),
  away integer check (away >= 0),
  size integer check (size >= 1),
  fee_waiting amount,
  fee_call amount,
  fee_per_hour amount,
  email text,
  phone text,
  bring text[],
  food text,
  access text,
  headphones text,
  note text
);
alter table members add foreign key (production_id, person_id) references people (production_id, id);
create unique index members_person_index on members (production_id, person_id) where person_id is not null;
alter table invitations add foreign key (production_id, person_id) references people (production_id, id);
alter table links add foreign key (production_id, person_id) references people (production_id, id);

create table gear (${ROW}, unique (production_id, key),
  name text,
  count integer check (count >= 1),
  price amount,
  note text
);

create table hours (${ENTRY}, ${ref('room_id', 'rooms', 'not null', 'cascade')},
  kind text not null check (kind in ('open', 'loud')), ${SPAN});
create table room_hears (${ENTRY}, ${ref('room_id', 'rooms', 'not null', 'cascade')}, ${ref('heard_room_id', 'rooms', 'not null')},
  unique (room_id, position));
create table room_operators (${ENTRY}, ${ref('room_id', 'rooms', 'not null', 'cascade')}, ${ref('person_id', 'people', 'not null')},
  unique (room_id, position));
create table windows (${ENTRY}, ${ref('person_id', 'people', 'not null', 'cascade')}, sure boolean, ${SPAN},
  unique (person_id, position));
create table gear_windows (${ENTRY}, ${ref('gear_id', 'gear', 'not null', 'cascade')}, ${SPAN},
  unique (gear_id, position));

create table setups (${ROW}, unique (production_id, key), ${ref('room_id', 'rooms')},
  name text,
  rig integer check (rig >= 0),
  keep_until text check (keep_until = 'approved'),
  note text
);
create table setup_ready (${ENTRY}, ${ref('setup_id', 'setups', 'not null', 'cascade')}, ${ref('person_id', 'people', 'not null')},
  minutes integer not null check (minutes >= 0), unique (setup_id, person_id));
create table setup_contents (${ENTRY}, ${ref('setup_id', 'setups', 'not null', 'cascade')},
  kind text not null check (kind in ('line', 'microphone', 'stand', 'player', 'baffle', 'cue', 'circuit', 'place')),
  label text not null,
  count integer not null default 1 check (count >= 1),
  details jsonb not null default '{}',
  unique (setup_id, position));

create table changeovers (
  id uuid primary key default gen_random_uuid(),
  production_id uuid not null references productions on delete cascade,
  position integer not null check (position >= 0),
  revision integer not null check (revision >= 0),
  removed_at timestamptz,
  given_empty text[] not null default '{}',
  extra json,
  ${ref('from_setup_id', 'setups', 'not null')},
  ${ref('to_setup_id', 'setups', 'not null')},
  minutes integer not null check (minutes >= 0),
  unique (production_id, from_setup_id, to_setup_id)
);

create table events (${ROW}, unique (production_id, key), ${ref('room_id', 'rooms')}, ${SPAN},
  name text,
  kind text,
  note text
);
create table event_people (${ENTRY}, ${ref('event_id', 'events', 'not null', 'cascade')}, ${ref('person_id', 'people', 'not null')},
  unique (event_id, position));

${index('hours', 'production_id', 'room_id')}
${index('room_hears', 'production_id', 'heard_room_id')}
${index('room_operators', 'production_id', 'person_id')}
${index('windows', 'production_id')}
${index('gear_windows', 'production_id')}
${index('setups', 'room_id')}
${index('setup_ready', 'production_id', 'person_id')}
${index('setup_contents', 'production_id')}
${index('changeovers', 'from_setup_id', 'to_setup_id')}
${index('events', 'room_id')}
${index('event_people', 'production_id', 'person_id')}
`,
  `
alter table links drop constraint links_production_id_person_id_fkey;
alter table invitations drop constraint invitations_production_id_person_id_fkey;
alter table members drop constraint members_production_id_person_id_fkey;
drop index members_person_index;
drop table event_people, events, changeovers, setup_contents, setup_ready, setups, gear_windows, windows, room_operators, room_hears, hours,
  gear, people, rooms;`,
);
