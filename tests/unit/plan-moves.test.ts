import { describe, expect, it } from 'vitest';
import { planDays } from '../../shared/planner/day';
import { dropOf, moveOf, onGrid, pinInWords } from '../../shared/planner/moves';
import { editsToSetPass, editsToWritePasses, passName } from '../../shared/domain/passes';
import { fileOf, HEAD, rowsOf } from '../../shared/domain/changes';
import { effectivePasses } from '../../shared/planner/derive';
import { sampleFile, samplePlan } from '../factories/plan-sample';

const file = sampleFile();
const days = planDays(file, samplePlan());

describe('moving a pass by hand', () => {
  it('puts it before its neighbour by bounding when it has to be over', () => {
    // S2 lasts 75 minutes; S1 before it starts at 12:30 and is pinned, so it cannot give way; unpinned it can.
    expect(moveOf(file, days, 's2-basics', 'earlier')).toEqual({
      refused: 'S1 Weir Song is pinned and stays. Unpin it first to change places with it.',
    });
    const loose = sampleFile();
    delete loose.passes![0]!.pin;
    expect(moveOf(loose, planDays(loose, samplePlan()), 's2-basics', 'earlier')).toMatchObject({
      pin: { day: '2027-03-08', notAfter: '2027-03-08T13:45' },
    });
  });

  it('puts it after its neighbour by bounding when it may start', () => {
    expect(moveOf(file, days, 's1-horns', 'later')).toMatchObject({ pin: { day: '2027-03-09', notBefore: '2027-03-09T15:30' } });
    expect(moveOf(file, days, 's1-basics', 'later')).toMatchObject({ pin: { day: '2027-03-08', notBefore: '2027-03-08T14:30' } });
  });

  it('changes places only within its room, and says when there is nobody to change with', () => {
    // The organ in Room B overlaps the horns in Room A; they are no neighbours.
    expect(moveOf(file, days, 's3-organ', 'earlier')).toEqual({ refused: 'S3 organ is the first pass of that day in its room.' });
    expect(moveOf(file, days, 's3-solo', 'later')).toEqual({ refused: 'S3 trumpet solo is the last pass of that day in its room.' });
    expect(moveOf(file, days, 's2-shaker', 'later')).toEqual({ refused: 'It is not in the plan; take it in first.' });
  });

  it('goes to another day on which its room is open, leaving the time free', () => {
    expect(moveOf(file, days, 's1-basics', 'dayAfter')).toEqual({
      pin: { day: '2027-03-09' },
      says: 'S1 Weir Song goes to Tue 9 March',
    });
    expect(moveOf(file, days, 's1-basics', 'dayBefore')).toEqual({ refused: 'Room A is not open on any day before Mon 8 March.' });
    expect(moveOf(file, days, 's3-organ', 'dayBefore')).toEqual({ refused: 'Room B is not open on any day before Tue 9 March.' });
  });

  it('stands where it is dropped, on the grid, if its room is open for all of it', () => {
    const tuesday = days[1]!;
    const at = (clockMinutes: number) => tuesday.from + clockMinutes - 600;
    expect(onGrid(file, days, { date: '2027-03-09', at: at(872.4) })).toBe(at(870));
    expect(dropOf(file, days, 's1-basics', { date: '2027-03-09', at: at(872.4) })).toEqual({
      pin: { at: '2027-03-09T14:30' },
      says: 'S1 Weir Song goes to 14:30 on Tue 9 March',
    });
    // It lasts 75 minutes, and Room A closes at 20:00.
    expect(dropOf(file, days, 's1-basics', { date: '2027-03-09', at: at(1130) })).toEqual({
      refused: 'Room A is not open for S1 Weir Song at 18:50 on Tue 9 March.',
    });
  });

  it('says a pin in words', () => {
    expect(pinInWords({ at: '2027-03-08T12:30' })).toBe('at 12:30 on Mon 8 March');
    expect(pinInWords({ day: '2027-03-08', notAfter: '2027-03-08T13:45' })).toBe('on Mon 8 March, over by 13:45');
    expect(pinInWords({ notBefore: '2027-03-09T10:00' })).toBe('not before 10:00 on Tue 9 March');
  });
});

describe('writing passes out', () => {
  const derived = () => ({ ...sampleFile(), passes: undefined });

  it('writes every derived pass before one of them is set, so that none is lost', () => {
    const edits = editsToSetPass(derived(), 's1-basics', { pin: { day: '2027-03-08' } });
    const rows = rowsOf(derived()).map((row, position) => ({ ...row, position, revision: 1, removed: false }));
    const head = rows.find(({ resource }) => resource === 'production')!;
    for (const one of edits) {
      if (one.resource === 'production') head.fields = { ...head.fields, ...one.fields };
      else if (one.op === 'create') rows.push({ ...one, resource: 'passes', position: rows.length, revision: 2, removed: false });
      else Object.assign(rows.find(({ resource, key }) => resource === 'passes' && key === one.key)!.fields, one.fields);
    }
    const after = fileOf(rows);
    expect(edits[0]).toEqual({ resource: 'production', key: HEAD, op: 'update', fields: { passesByHand: true } });
    expect(effectivePasses(after)).toEqual(
      effectivePasses(derived()).map((pass) => (pass.id === 's1-basics' ? { ...pass, pin: { day: '2027-03-08' } } : pass)),
    );
  });

  it('writes nothing where passes are written already', () => {
    expect(editsToWritePasses(sampleFile())).toEqual([]);
  });

  it('calls a pass by its song where it is played together, by its part where it is added', () => {
    const name = (id: string) =>
      passName(
        file,
        file.passes!.find((pass) => pass.id === id)!,
      );
    expect(name('s1-basics')).toEqual({ code: 'S1', label: 'Weir Song', full: 'Weir Song' });
    expect(name('s1-horns')).toEqual({ code: 'S1', label: 'horns', full: 'Weir Song, horns' });
    const named = { ...file.passes![0]!, name: 'Weir Song: organ and horns' };
    expect(passName(file, named)).toEqual({ code: 'S1', label: 'organ and horns', full: 'Weir Song, organ and horns' });
    expect(passName(file, { ...named, name: 'Weir Song basics' }).label).toBe('Weir Song');
    expect(name('s3-solo')).toEqual({ code: 'S3', label: 'trumpet solo', full: 'Half a Ferry, trumpet solo' });
  });
});
