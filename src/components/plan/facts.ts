import type { ProductionFile } from '../../../shared/contracts/resources';
import { passInWords } from '../../../shared/domain/passes';
import { namesOf } from '../../../shared/domain/sheets/names';

/** Where a fact that clashes can be mended: a section of the production, or the pin of a pass. */
export interface Place {
  words: string;
  section: 'songs' | 'people' | 'rooms';
  /** The pass whose pin it is. */
  pin?: string;
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
      return field === 'pin' ? { words: `Unpin ${words}`, section: 'songs', pin: id } : { words, section: 'songs' };
    }
    default:
      return null;
  }
}
