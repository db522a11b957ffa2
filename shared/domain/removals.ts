import type { Pass, ProductionFile } from '../contracts/resources';
import { changeoverKey, partKey } from './changes';
import { edit, type Edit } from './edits';

/** Removing a thing takes it out of everything that names it, so that nothing points at what is no more. */

type Listed = 'people' | 'rooms' | 'gear' | 'setups' | 'events';
type Fields = Edit['fields'];

const without = <Item>(list: readonly Item[] | undefined, gone: (item: Item) => boolean): Item[] | null | undefined => {
  if (!list?.some(gone)) return undefined;
  const rest = list.filter((item) => !gone(item));
  return rest.length > 0 ? rest : null;
};

function withoutKey(record: Readonly<Record<string, number>> | undefined, key: string): Record<string, number> | null | undefined {
  if (!record || !(key in record)) return undefined;
  const rest = Object.fromEntries(Object.entries(record).filter(([name]) => name !== key));
  return Object.keys(rest).length > 0 ? rest : null;
}

/** Only the fields that change. */
const changed = (fields: Fields): Fields => Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined));
const cleared = (value: string | undefined, gone: string): null | undefined => (value === gone ? null : undefined);

type Naming = Partial<Pick<Pass, 'people' | 'voice' | 'room' | 'setup' | 'uses' | 'after' | 'before'>>;

/** What parts, songs and passes have in common: fields that name other things. */
function fieldsOfPass(pass: Naming, resource: Listed, id: string): Fields {
  if (resource === 'people') return { people: without(pass.people, (one) => one === id), voice: withoutKey(pass.voice, id) };
  if (resource === 'rooms') return { room: cleared(pass.room, id) };
  if (resource === 'setups') return { setup: cleared(pass.setup, id) };
  if (resource === 'gear') return { uses: without(pass.uses, (use) => use.gear === id) };
  return {
    after: without(pass.after, (need) => 'event' in need && need.event === id),
    before: without(pass.before, (what) => 'event' in what && what.event === id),
  };
}

/** Edits that remove a person, a room, a piece of gear, a set-up or an event, and every mention of it. */
export function changesForRemoval(file: ProductionFile, resource: Listed, id: string): Edit[] {
  const edits: Edit[] = [];
  const update = (of: Edit['resource'], key: string, fields: Fields): void => {
    const real = changed(fields);
    if (Object.keys(real).length > 0) edits.push(edit.update(of, key, real));
  };
  for (const song of file.songs) {
    if (resource === 'rooms' || resource === 'setups')
      update('songs', song.id, fieldsOfPass({ room: song.room, setup: song.setup }, resource, id));
    for (const part of song.parts ?? []) {
      const { voice, room, setup, uses, after } = part;
      const { people, ...rest } = fieldsOfPass({ people: part.players, voice, room, setup, uses, after }, resource, id);
      update('parts', partKey(song.id, part.id), { ...rest, players: people });
    }
  }
  for (const pass of file.passes ?? []) update('passes', pass.id, fieldsOfPass(pass, resource, id));
  for (const room of file.rooms) {
    if (resource === 'rooms') update('rooms', room.id, { hears: without(room.hears, (other) => other === id) });
    if (resource === 'people') update('rooms', room.id, { operators: without(room.operators, (one) => one === id) });
  }
  for (const setup of file.setups) {
    if (resource === 'rooms') update('setups', setup.id, { room: cleared(setup.room, id) });
    if (resource === 'people') update('setups', setup.id, { ready: withoutKey(setup.ready, id) });
  }
  for (const event of file.events) {
    if (resource === 'rooms') update('events', event.id, { room: cleared(event.room, id) });
    if (resource === 'people') update('events', event.id, { people: without(event.people, (one) => one === id) });
  }
  if (resource === 'setups')
    for (const { from, to } of file.changeovers)
      if (from === id || to === id) edits.push(edit.remove('changeovers', changeoverKey(from, to)));
  return [...edits.filter((one) => one.resource !== resource || one.key !== id), edit.remove(resource, id)];
}
