import { ENTRY, index, MINUTES_COLUMNS, PRIORITY, ref, ROW, sqlStep } from './support';

export const { up, down } = sqlStep(
  `
create table songs (${ROW}, unique (production_id, key), ${ref('room_id', 'rooms')}, ${ref('setup_id', 'setups')},
  code text,
  title text,
  length amount check (length > 0),
  musical_key text,
  capo integer check (capo >= 0),
  tuning text,
  pitch amount check (pitch > 0),
  tempo amount check (tempo > 0),
  free_tempo boolean,
  meter text,
  click boolean,
  form text,
  ${PRIORITY},
  rehearsal integer check (rehearsal between 0 and 4),
  note text,
  ${MINUTES_COLUMNS}
);

create table parts (${ROW}, ${ref('song_id', 'songs', 'not null')}, ${ref('room_id', 'rooms')}, ${ref('setup_id', 'setups')},
  name text,
  mode text check (mode in ('live', 'guide', 'overdub', 'double', 'stack', 'repair')),
  instrument text,
  takes integer check (takes >= 0),
  ${PRIORITY},
  fallback text,
  needs text[],
  loud boolean,
  quiet boolean,
  focus integer check (focus >= 1),
  pan double precision check (pan between -1 and 1),
  width double precision check (width between 0 and 1),
  note text,
  ${MINUTES_COLUMNS},
  unique (song_id, key)
);
create table part_players (${ENTRY}, ${ref('part_id', 'parts', 'not null', 'cascade')}, ${ref('person_id', 'people', 'not null')},
  unique (part_id, position));
create table part_voice (${ENTRY}, ${ref('part_id', 'parts', 'not null', 'cascade')}, ${ref('person_id', 'people', 'not null')},
  minutes integer not null check (minutes >= 0), unique (part_id, person_id));
create table part_uses (${ENTRY}, ${ref('part_id', 'parts', 'not null', 'cascade')}, ${ref('gear_id', 'gear', 'not null')},
  count integer check (count >= 1), unique (part_id, position));

create table passes (${ROW}, unique (production_id, key), ${ref('song_id', 'songs')}, ${ref('room_id', 'rooms')}, ${ref('setup_id', 'setups')},
  name text,
  ${PRIORITY},
  loud boolean,
  quiet boolean,
  pin_at wall_time,
  pin_day wall_date,
  pin_not_before wall_time,
  pin_not_after wall_time,
  left_out boolean,
  note text,
  ${MINUTES_COLUMNS},
  check (minutes_low is not null)
);
create table pass_people (${ENTRY}, ${ref('pass_id', 'passes', 'not null', 'cascade')}, ${ref('person_id', 'people', 'not null')},
  unique (pass_id, position));
create table pass_parts (${ENTRY}, ${ref('pass_id', 'passes', 'not null', 'cascade')}, ${ref('part_id', 'parts', 'not null')},
  unique (pass_id, position));
create table pass_voice (${ENTRY}, ${ref('pass_id', 'passes', 'not null', 'cascade')}, ${ref('person_id', 'people', 'not null')},
  minutes integer not null check (minutes >= 0), unique (pass_id, person_id));
create table pass_uses (${ENTRY}, ${ref('pass_id', 'passes', 'not null', 'cascade')}, ${ref('gear_id', 'gear', 'not null')},
  count integer check (count >= 1), unique (pass_id, position));
create table pass_relations (${ENTRY}, ${ref('pass_id', 'passes', 'not null', 'cascade')}, ${ref('other_pass_id', 'passes', 'not null')},
  kind text not null check (kind in ('together', 'apart')), check (pass_id <> other_pass_id), unique (pass_id, kind, position));

-- What a pass or a part waits for or must precede: a pass, a derived pass (which is no row and is named by its key), or an event.
create table dependencies (${ENTRY}, ${ref('pass_id', 'passes', 'null', 'cascade')}, ${ref('part_id', 'parts', 'null', 'cascade')},
  kind text not null check (kind in ('after', 'before')),
  ${ref('needed_pass_id', 'passes')},
  needed_pass_key resource_key,
  ${ref('needed_event_id', 'events')},
  relation text check (relation in ('captured', 'approved')),
  lag integer check (lag >= 0),
  check (num_nonnulls(pass_id, part_id) = 1),
  check (num_nonnulls(needed_pass_id, needed_pass_key, needed_event_id) = 1),
  check (needed_pass_key is null or part_id is not null),
  check (needed_event_id is null or relation is null),
  check (kind = 'after' or (relation is null and lag is null)),
  check (needed_pass_id <> pass_id)
);

${index('songs', 'room_id', 'setup_id')}
${index('parts', 'room_id', 'setup_id')}
${index('part_players', 'production_id', 'person_id')}
${index('part_voice', 'production_id', 'person_id')}
${index('part_uses', 'production_id', 'gear_id')}
${index('passes', 'song_id', 'room_id', 'setup_id')}
${index('pass_people', 'production_id', 'person_id')}
${index('pass_parts', 'production_id', 'part_id')}
${index('pass_voice', 'production_id', 'person_id')}
${index('pass_uses', 'production_id', 'gear_id')}
${index('pass_relations', 'production_id', 'other_pass_id')}
${index('dependencies', 'production_id', 'pass_id', 'part_id', 'needed_pass_id', 'needed_event_id')}
`,
  `drop table dependencies, pass_relations, pass_uses, pass_voice, pass_parts, pass_people, passes, part_uses, part_voice, part_players, parts, songs;`,
);
