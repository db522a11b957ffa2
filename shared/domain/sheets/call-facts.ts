import type { MadePlan } from '../../contracts/plan';
import type { ProductionFile } from '../../contracts/resources';
import { dayWords, length } from '../../time/words';
import type { PersonId, WallDate } from '../flavours';
import { type Names, namesOf } from './names';
import type { CallFact } from './sheet';

/** Said where the production says nothing of its own (common practice, no source). */
const QUIET_DRESS = 'Quiet: soft shoes, nothing that rustles, no jewellery that sounds.';

/** Where to come, what to bring and to wear, and what to take care of, for one person; no fact of anybody else, and no money. */
export function callFacts(file: ProductionFile, plan: MadePlan, id: PersonId): CallFact[] {
  const names = namesOf(file);
  const person = names.person(id);
  const { place, late, dress } = file.production;
  const passes = plan.items.flatMap((item) => {
    const pass = item.kind === 'pass' ? names.pass(item.id) : undefined;
    return pass && item.people.includes(id) ? [pass] : [];
  });
  const ears = passes.some((pass) => pass.loud) ? 'Loud work: bring ear protection, start with the headphones turned down.' : '';
  const voice = sungByDay(plan, id, names)
    .map(({ date, minutes }) => `${dayWords(date)} about ${length(minutes)}`)
    .join(', ');
  const facts: [string, string | undefined][] = [
    ['Where', [place?.name, place?.address].filter(Boolean).join(', ')],
    ['Door', place?.door],
    ['Parking', place?.parking],
    ['Phone', place?.phone],
    ['Late?', late === undefined ? undefined : `Ring ${late}`],
    ['Bring', (person?.bring ?? []).join(', ')],
    ['Wear', dress ?? QUIET_DRESS],
    ['Food', person?.food],
    ['Access', person?.access],
    ['Headphones', person?.headphones],
    ['Ears', ears],
    ['Voice', voice === '' ? '' : `${voice} of singing. Warm up, keep water by you, rest between takes.`],
  ];
  return facts.flatMap(([label, says]) => (says === undefined || says.trim() === '' ? [] : [{ label, says }]));
}

/** Singing minutes of each day, so that the voice can be spared the evening before. */
function sungByDay(plan: MadePlan, person: PersonId, names: Names): { date: WallDate; minutes: number }[] {
  const sung = new Map<WallDate, number>();
  for (const item of plan.items) {
    const minutes = item.kind === 'pass' ? (names.pass(item.id)?.voice?.[person] ?? 0) : 0;
    const date = plan.calls.find((call) => call.person === person && call.arrive <= item.start && item.end <= call.release)?.date;
    if (minutes > 0 && date !== undefined) sung.set(date, (sung.get(date) ?? 0) + minutes);
  }
  return [...sung].map(([date, minutes]) => ({ date, minutes })).sort((a, b) => (a.date < b.date ? -1 : 1));
}
