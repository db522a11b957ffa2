import type { Person, ProductionFile } from '../contracts/resources';
import type { PlanItem } from '../contracts/plan';
import type { Minute, Minutes, PersonId, RoomId } from '../domain/flavours';

/** What one person does in a stretch of a stay; the stretches between the marks are waiting. */
export interface ThreadMark {
  from: Minute;
  to: Minute;
  /** `play`: a pass, an event or a listen they belong to; `ready`: rigging and warming up; `rest`: a meal or a break. */
  as: 'play' | 'ready' | 'rest';
  room: RoomId | null;
}

/** From arrival to release without time off in between. */
export interface Stay {
  arrive: Minute;
  release: Minute;
  marks: ThreadMark[];
}

/** A plan item with its times as minutes. */
export interface TimedItem extends PlanItem {
  from: Minute;
  to: Minute;
}

const OWN: ReadonlySet<PlanItem['kind']> = new Set(['pass', 'event', 'listen']);
const REST: ReadonlySet<PlanItem['kind']> = new Set(['meal', 'break']);
const WORK_ON_THE_ROOM: ReadonlySet<PlanItem['kind']> = new Set(['rig', 'changeover']);

/** Whether a person is in an item: by name, or as the operator of a pass's room. */
function belongs(item: TimedItem, person: PersonId, file: Pick<ProductionFile, 'rooms'>): boolean {
  if (item.people.includes(person)) return true;
  return item.kind === 'pass' && (file.rooms.find(({ id }) => id === item.room)?.operators ?? []).includes(person);
}

/** The same mark without what is covered by others: nobody rests while they play. */
function without(mark: ThreadMark, others: ThreadMark[]): ThreadMark[] {
  return others.reduce<ThreadMark[]>(
    (left, other) =>
      left.flatMap((part) => {
        if (other.to <= part.from || part.to <= other.from) return [part];
        const before = other.from > part.from ? [{ ...part, to: other.from }] : [];
        const after = other.to < part.to ? [{ ...part, from: other.to }] : [];
        return [...before, ...after];
      }),
    [mark],
  );
}

/**
 * The stays of one person on one date, with what they do in them.
 * @param items the plan's items of that date
 * @param call their call of that date, with its times as minutes; it opens the first stay and closes the last
 * A gap of at least the person's `away` is time off and splits a stay.
 */
export function staysOf(
  person: Pick<Person, 'id' | 'away'>,
  items: TimedItem[],
  call: { arrive: Minute; release: Minute },
  file: Pick<ProductionFile, 'rooms' | 'setups'>,
): Stay[] {
  const within = (from: Minute, to: Minute): { from: Minute; to: Minute } => ({
    from: Math.max(from, call.arrive),
    to: Math.min(to, call.release),
  });
  const mark = (item: TimedItem, as: ThreadMark['as'], from = item.from): ThreadMark => ({
    ...within(from, item.to),
    as,
    room: item.room ?? null,
  });

  const play = items.filter((item) => OWN.has(item.kind) && belongs(item, person.id, file)).map((item) => mark(item, 'play'));
  const ready = items.flatMap((item) => {
    if (!WORK_ON_THE_ROOM.has(item.kind)) return [];
    if (item.people.includes(person.id)) return [mark(item, 'ready')];
    const minutes = item.kind === 'rig' ? file.setups.find(({ id }) => id === item.setup)?.ready?.[person.id] : undefined;
    return minutes ? [mark(item, 'ready', Math.max(item.from, item.to - minutes))] : [];
  });
  const rooms = new Set(play.map(({ room }) => room));
  const rest = items
    .filter((item) => REST.has(item.kind))
    .filter((item) => (item.people.length > 0 ? item.people.includes(person.id) : rooms.has(item.room ?? null)))
    .map((item) => mark(item, 'rest'));

  const filled = (marks: ThreadMark[]): ThreadMark[] => marks.filter(({ from, to }) => from < to);
  const work = [...filled(play), ...filled(ready).flatMap((one) => without(one, filled(play)))].sort((a, b) => a.from - b.from);
  const rests = filled(rest).flatMap((one) => without(one, work));
  return split(work, rests, call, person.away);
}

function split(work: ThreadMark[], rests: ThreadMark[], call: { arrive: Minute; release: Minute }, away: Minutes | undefined): Stay[] {
  const stays: Stay[] = [{ arrive: call.arrive, release: call.arrive, marks: [] }];
  for (const mark of work) {
    const stay = stays.at(-1)!;
    const opened = stay.marks.length > 0;
    if (opened && away !== undefined && mark.from - stay.release >= away)
      stays.push({ arrive: mark.from, release: mark.to, marks: [mark] });
    else {
      stay.marks.push(mark);
      stay.release = Math.max(stay.release, mark.to);
    }
  }
  const last = stays.at(-1)!;
  last.release = Math.max(last.release, call.release);
  for (const stay of stays) {
    stay.marks.push(...rests.filter(({ from, to }) => stay.arrive <= from && to <= stay.release));
    stay.marks.sort((a, b) => a.from - b.from || a.to - b.to);
  }
  return stays;
}
