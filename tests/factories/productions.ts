import { randomUUID } from 'node:crypto';
import type { Change } from '../../shared/contracts/changes';
import type { MadePlan } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';

/** A production of one room, two players and two passes, without meals, breaks, wrap, listening or reserve: plans for it fit on a page. */
export function smallProduction(change: Partial<ProductionFile> = {}): ProductionFile {
  return {
    production: {
      code: 'BRIDGE',
      title: 'Two Bridges',
      timezone: 'Europe/Lisbon',
      rules: { mealAfter: 0, meal: 0, breakAfter: 0, break: 0, wrap: 0, listen: 0, reserve: 0 },
    },
    rooms: [{ id: 'hall', name: 'Hall', open: [{ from: '2027-03-08T10:00', to: '2027-03-08T18:00' }], price: { day: 400 } }],
    people: [
      {
        id: 'una',
        name: 'Una Fenn',
        plays: ['voice'],
        email: 'una@example.org',
        phone: '+351 555 010 001',
        fee: { waiting: 1, call: 90, perHour: 20 },
      },
      { id: 'teo', name: 'Teo Lark', plays: ['drums'] },
    ],
    gear: [{ id: 'celesta', name: 'Celesta', count: 1, price: 120 }],
    setups: [],
    changeovers: [],
    songs: [
      {
        id: 'first',
        title: 'Stone Ferry',
        parts: [
          { id: 'drums', players: ['teo'], mode: 'live' },
          { id: 'lead', players: ['una'], mode: 'overdub' },
        ],
      },
    ],
    passes: [
      { id: 'first-basics', song: 'first', parts: ['drums'], people: ['teo'], room: 'hall', minutes: [50, 60, 90] },
      { id: 'first-lead', song: 'first', parts: ['lead'], people: ['una'], room: 'hall', minutes: 60, after: [{ pass: 'first-basics' }] },
    ],
    events: [],
    ...change,
  };
}

const clock = (minute: number) => `2027-03-08T${String(Math.floor(minute / 60)).padStart(2, '0')}:${String(minute % 60).padStart(2, '0')}`;

/** A valid plan of the small production: the drums from `start` (minutes after midnight), the voice right after them. */
export function smallPlan(start = 600): MadePlan {
  const call = (person: string, from: number) => ({
    person,
    date: '2027-03-08',
    arrive: clock(from),
    ready: clock(from),
    release: clock(from + 60),
    working: 60,
    waiting: 0,
  });
  return {
    status: 'feasible',
    cost: { total: 150, waiting: 0, changeover: 0, day: 120, overtime: 0, call: 30, maybe: 0, unplaced: 0 },
    bound: 150,
    seconds: 0.1,
    items: [
      { kind: 'pass', id: 'first-basics', room: 'hall', start: clock(start), end: clock(start + 60), people: ['teo'] },
      { kind: 'pass', id: 'first-lead', room: 'hall', start: clock(start + 60), end: clock(start + 120), people: ['una'] },
    ],
    calls: [call('teo', start), call('una', start + 60)],
    unplaced: [],
    odds: { musts: 1, days: [{ room: 'hall', date: '2027-03-08', p50: clock(start + 120), p90: clock(start + 150) }] },
    conflicts: [],
  };
}

/** A change with an id of its own. */
export const aChange = (
  resource: Change['resource'],
  key: string,
  op: Change['op'],
  fields: Record<string, unknown> = {},
  more: Partial<Change> = {},
): Change => ({ id: randomUUID(), resource, key, op, fields, ...more });
