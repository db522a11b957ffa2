import { describe, expect, it } from 'vitest';
import { changesForRemoval } from '../../shared/domain/removals';
import { edited, writtenBand } from '../factories/band';

/** The band, with everything that can name a person, a room, a set-up, a piece of gear or an event. */
function namedBand() {
  const file = writtenBand();
  file.rooms[0]!.operators = ['lys'];
  file.rooms.push({ id: 'b', name: 'Room B', open: [], hears: ['a'] });
  file.gear.push({ id: 'organ' });
  file.setups[0]!.ready = { tobin: 60, lys: 10 };
  file.setups.push({ id: 'brushes', room: 'b' });
  file.changeovers.push({ from: 'kit', to: 'brushes', minutes: 45 });
  file.events.push({ id: 'tuner', from: '2027-03-08T08:00', to: '2027-03-08T09:00', room: 'a', people: ['lys'] });
  file.songs[0]!.setup = 'kit';
  file.passes![1]!.uses = [{ gear: 'organ' }];
  file.passes![1]!.voice = { lys: 5, oka: 6 };
  file.passes![1]!.after = [{ event: 'tuner' }];
  file.passes![1]!.before = [{ event: 'tuner' }, { pass: 's2-basics' }];
  return file;
}

describe('removing', () => {
  it.each([
    ['people', 'lys'],
    ['rooms', 'a'],
    ['gear', 'organ'],
    ['setups', 'kit'],
    ['events', 'tuner'],
  ] as const)('%s %s leaves no mention behind', (resource, id) => {
    const file = namedBand();
    expect(JSON.stringify(file)).toContain(`"${id}"`);
    const after = edited(file, changesForRemoval(file, resource, id));
    expect(JSON.stringify(after)).not.toContain(`"${id}"`);
  });

  it('leaves what else stood beside the mention', () => {
    const file = namedBand();
    const after = edited(file, changesForRemoval(file, 'people', 'lys'));
    expect(after.passes?.[1]).toMatchObject({ people: ['oka'], voice: { oka: 6 } });
    expect(after.setups[0]?.ready).toEqual({ tobin: 60 });
    expect(after.rooms[0]?.operators).toBeUndefined();
    expect(edited(file, changesForRemoval(file, 'events', 'tuner')).passes?.[1]?.before).toEqual([{ pass: 's2-basics' }]);
  });
});
