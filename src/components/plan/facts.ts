import type { ProductionFile } from '../../../shared/contracts/resources';
import type { PassId } from '../../../shared/domain/flavours';
import { passInWords } from '../../../shared/domain/passes';
import { namesOf } from '../../../shared/domain/sheets/names';

/** Where a fact that clashes can be mended: a section of the production, or the pin of a pass. */
export interface Place {
  words: string;
  section: 'songs' | 'people' | 'rooms';
  /** What can be done about it on the spot. */
  act?: Mending;
}
export interface Mending {
  does: 'unpin' | 'leaveOut' | 'takeIn';
  pass: PassId;
}

/** The places of facts such as `people.lys.windows`, each named once. */
export function placesOf(facts: readonly string[], file: ProductionFile): Place[] {
  const places = new Map<string, Place>();
  for (const fact of facts) {
    const place = placeOf(fact, file);
    if (place) places.set(place.words, place);
  }
  return [...places.values()];
}

function placeOf(fact: string, file: ProductionFile): Place | null {
  const [list = '', id = '', field] = fact.split('.');
  const names = namesOf(file);
  switch (list) {
    case 'people':
      return { words: `${names.short(id)}: ${field === 'limits' ? 'limits' : 'hours'}`, section: 'people' };
    case 'rooms':
      return {
        words: `${file.rooms.find((room) => room.id === id)?.name ?? id}: ${field === 'open' ? 'hours' : (field ?? 'room')}`,
        section: 'rooms',
      };
    case 'gear':
      return {
        words: `${file.gear.find((gear) => gear.id === id)?.name ?? id}: ${field === 'windows' ? 'hire' : 'count'}`,
        section: 'rooms',
      };
    case 'events':
      return { words: names.event(id), section: 'rooms' };
    case 'passes': {
      const pass = names.pass(id);
      const words = pass ? passInWords(file, pass) : id;
      if (field === 'pin') return { words: `Unpin ${words}`, section: 'songs', act: { does: 'unpin', pass: id } };
      if (field !== undefined) return { words, section: 'songs' };
      if (pass?.leftOut) return { words: `Take ${words} in again`, section: 'songs', act: { does: 'takeIn', pass: id } };
      return { words: `Leave ${words} out`, section: 'songs', act: { does: 'leaveOut', pass: id } };
    }
    default:
      return null;
  }
}
