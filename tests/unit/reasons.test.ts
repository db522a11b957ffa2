import { describe, expect, it } from 'vitest';
import { whyHere } from '../../shared/planner/reasons';
import { whoWaits } from '../../shared/planner/waiting';
import { aPass, emptyProduction, hours } from '../factories/bare-production';
import { twoRoomFile, twoRoomPlan } from '../factories/two-room-plan';

describe('why a pass is where it is', () => {
  const why = (id: string) => whyHere(twoRoomFile(), twoRoomPlan(), id).join('\n');

  it('names its pin, what waits for it and what lies before it', () => {
    const reasons = why('s1-basics');
    expect(reasons).toContain('is pinned on Mon 8 March, not before Mon 8 March 11:00 and to end by Mon 8 March 13:00.');
    expect(reasons).toContain('So it can begin only Mon 8 March 11:00–11:55.');
    expect(reasons).toMatch(/s2 s2 \(Tue 9 March 11:30\) and s1 s1 \(Tue 9 March 13:45\) wait for it\./);
    expect(reasons).toContain('It follows the rig of full-kit (Mon 8 March 10:00–11:30).');
    expect(reasons).toContain('Room a is taken by the break until then.');
  });
  it('names the guest’s windows, an event it comes after and the pass it goes together with', () => {
    const reasons = why('s2-horn');
    expect(reasons).toContain('Lys is free only Tue 9 March 13:00–17:00.');
    expect(reasons).toContain('It goes together with s1 s1.');
  });
  it('names hire, listening and neighbours on the same set-up', () => {
    expect(why('s1-organ')).toContain('Organ is there Tue 9 March 12:00–18:00.');
    expect(why('s1-organ')).toContain('booth stands for s1 s1 too, so no changeover lies between them.');
    expect(why('s2-basics')).toContain('which ends Mon 8 March 12:50 and is listened to Tue 9 March 10:00.');
    expect(why('s1-organ')).not.toContain('It follows');
  });
  it('says why a pass is not there', () => {
    expect(whyHere(twoRoomFile(), twoRoomPlan(), 's3-left')).toEqual(['It was left out by hand.']);
    expect(whyHere(twoRoomFile(), twoRoomPlan(), 's3-hum')).toEqual(['The plan costs less without it, or no place was left for it.']);
    const file = emptyProduction([
      aPass('late', { priority: 'nice', people: ['lys'], after: [{ pass: 'base' }] }),
      aPass('base', { priority: 'nice', people: ['lys'] }),
    ]);
    expect(whyHere(file, { items: [] }, 'late')).toEqual(['It comes after base, which is not in the plan either.']);
    file.people[2]!.windows = [hours('09', '21:00', '22:00')];
    expect(whyHere(file, { items: [] }, 'base')).toEqual([
      'There is no time at all for it.',
      'Lys Marrow is free only Tue 9 March 21:00–22:00.',
    ]);
  });
  it('says so when nothing ties it', () => {
    const items = [{ kind: 'pass' as const, id: 'free', room: 'a', start: '2027-03-08T12:00', end: '2027-03-08T13:00', people: [] }];
    expect(whyHere(emptyProduction([aPass('free')]), { items }, 'free')).toEqual([
      'Nothing ties it to this place: the whole plan costs least so.',
    ]);
    expect(whyHere(emptyProduction(), { items: [] }, 'unknown')).toEqual([]);
  });
});

describe('who waits', () => {
  it('lists each wait with its gaps, what it is for and what goes on meanwhile', () => {
    expect(whoWaits(twoRoomFile(), twoRoomPlan())).toEqual([
      {
        person: 'dov',
        date: '2027-03-09',
        waiting: 75,
        gaps: [
          {
            from: '2027-03-09T12:30',
            to: '2027-03-09T14:30',
            minutes: 75,
            says: '12:30–14:30, 1 h 15 besides the pauses until s1 s1; meanwhile the rig of booth, s2 s2, s1 s1',
          },
        ],
      },
    ]);
  });
  it('tells the longest first and leaves out who never waits', () => {
    const plan = twoRoomPlan();
    plan.calls.find((call) => call.person === 'jo' && call.date === '2027-03-09')!.waiting = 90;
    expect(whoWaits(twoRoomFile(), plan).map(({ person }) => person)).toEqual(['jo', 'dov']);
  });
});
