import { describe, expect, it } from 'vitest';
import { runSheet } from '../../shared/domain/sheets/run-sheet';
import type { RunLine, RunRow, RunSheet } from '../../shared/domain/sheets/sheet';
import { SHEET_DAYS, sheetFile, sheetPlan } from '../factories/sheet-sample';

const edition = { version: 3, printed: '2026-12-01T14:30' };
const sheetOf = (date: string, room?: string): RunSheet => {
  const sheet = runSheet(sheetFile(), sheetPlan(), { date, room, edition });
  if (!sheet) throw new Error('no sheet');
  return sheet;
};
const linesOf = (sheet: RunSheet, room = 0): RunLine[] => sheet.rooms[room]!.pages.flatMap((page) => page.lines);
const rowsOf = (sheet: RunSheet, room = 0): RunRow[] => linesOf(sheet, room).filter((line) => line.is === 'row');

describe('the run sheet of a day', () => {
  it('says which production, day, version and moment of printing it is', () => {
    const sheet = sheetOf(SHEET_DAYS.first);
    expect(sheet.head).toEqual({
      what: 'Run sheet',
      of: 'Mon 8 March 2027',
      code: 'SLUICE',
      title: 'Nine Sluices',
      paper: 'A4',
      edition: 'Version 3',
      draft: false,
      printed: 'printed Tue 1 December 2026 14:30',
    });
    expect([sheet.day, sheet.count]).toEqual(['Mon 8 March 2027', 'day 1 of 3']);
  });

  it('calls a plan without a number a draft', () => {
    const sheet = runSheet(sheetFile(), sheetPlan(), { date: SHEET_DAYS.first, edition: { ...edition, version: null } });
    expect(sheet?.head).toMatchObject({ edition: 'DRAFT', draft: true });
  });

  it('shows every item of the room by the clock with its song, people and set-up', () => {
    const rows = rowsOf(sheetOf(SHEET_DAYS.first));
    expect(rows.map((row) => [row.from, row.to, row.kind])).toEqual([
      ['10:00', '10:30', 'event'],
      ['10:30', '13:00', 'rig'],
      ['13:00', '14:05', 'pass'],
      ['14:05', '14:50', 'meal'],
      ['14:50', '15:55', 'pass'],
      ['15:55', '16:10', 'break'],
      ['16:10', '17:15', 'pass'],
      ['17:15', '18:00', 'reserve'],
      ['18:00', '18:45', 'wrap'],
    ]);
    expect(rows[2]).toMatchObject({
      code: 'S1',
      title: 'Weir Song',
      task: 'live: drums, bass · guide: lead vocal',
      people: ['Tob', 'Dov', 'Mara'],
      setup: 'Full kit',
      note: 'two takes, then listen',
    });
    expect(rows[7]).toMatchObject({ title: 'Reserve', minutes: 45 });
    expect(rows[1]).toMatchObject({
      task: 'Full kit',
      people: ['Tob 11:45', 'Dov 12:30'],
      note: 'two to lift, walkways clear, mute before patching',
    });
  });

  it('tells those who get ready in a rig with their times in its own row, and not twice', () => {
    const marks = linesOf(sheetOf(SHEET_DAYS.first)).flatMap((line) => (line.is === 'people' ? line.arrive : []));
    expect(marks).toEqual(['Mara', 'Jo']);
  });

  it('says out of which set-up a change is made, also over night', () => {
    expect(rowsOf(sheetOf(SHEET_DAYS.full))[1]).toMatchObject({ kind: 'changeover', task: 'Full kit → Brushes and double bass' });
  });

  it('puts arrivals, releases and stops between the rows in the order of the clock', () => {
    const lines = linesOf(sheetOf(SHEET_DAYS.full));
    const told = lines.map((line) => {
      if (line.is === 'row') return line.from;
      if (line.is === 'people') return `${line.at} +${line.arrive.join(',')} -${line.release.join(',')}`;
      return `${line.at} ${line.is === 'stop' ? line.who.join(',') : ''} ${line.says}`;
    });
    expect(told).toContain('13:30 +岡,ليس -');
    expect(told.indexOf('13:30 +岡,ليس -')).toBe(told.indexOf('13:30') - 1);
    expect(told.indexOf('17:00 ليس leaves')).toBeGreaterThan(told.indexOf('16:55'));
    expect(told.indexOf('17:00 ليس leaves')).toBeLessThan(told.indexOf('17:10'));
    expect(told).toContain('19:00  no loud work from here');
    expect(lines.map((line) => (line.is === 'row' ? line.from : line.at))).toEqual(
      lines.map((line) => (line.is === 'row' ? line.from : line.at)).toSorted(),
    );
  });

  it('lets somebody who works in two rooms arrive in the first and go from the last', () => {
    const sheet = sheetOf(SHEET_DAYS.full);
    const petra = (room: number) =>
      linesOf(sheet, room).flatMap((line) =>
        line.is === 'people' ? [...line.arrive.map((who) => `+${who}`), ...line.release.map((who) => `-${who}`)] : [],
      );
    expect(petra(1)).toEqual(['+Petra']);
    expect(petra(0)).toContain('-Petra');
    expect(petra(0)).not.toContain('+Petra');
  });

  it('names hired gear that has to go by a time of the day', () => {
    expect(linesOf(sheetOf(SHEET_DAYS.full, 'b'))).toContainEqual({ is: 'stop', at: '18:00', who: [], says: 'hired organ goes' });
  });

  it('gives the end as a range on the grid of the plan, never earlier than the odds', () => {
    expect(sheetOf(SHEET_DAYS.first).rooms[0]?.ends).toEqual({ half: '18:45', nineInTen: '19:40' });
    expect(sheetOf(SHEET_DAYS.night).rooms[0]?.ends).toBeNull();
  });

  it('notes what goes on in the other room, and can show one room alone', () => {
    const both = sheetOf(SHEET_DAYS.full);
    expect(both.rooms.map((room) => room.room)).toEqual(['Room A', 'Room B']);
    expect(both.rooms[0]!.pages.at(-1)!.meanwhile).toContainEqual({
      room: 'Room B',
      from: '13:30',
      to: '14:15',
      says: 'S3 overdub: organ (Petra)',
    });
    expect(sheetOf(SHEET_DAYS.full, 'b').rooms.map((room) => room.room)).toEqual(['Room B']);
  });

  it('gives no page to a room in which nothing but an event happens, and notes events elsewhere beside the work', () => {
    const plan = sheetPlan();
    plan.items = plan.items.filter((item) => item.room !== 'b' || item.kind === 'event');
    plan.items.push({
      kind: 'event',
      id: 'tuner',
      room: 'b',
      start: `${SHEET_DAYS.full}T12:00`,
      end: `${SHEET_DAYS.full}T12:30`,
      people: [],
    });
    const sheet = runSheet(sheetFile(), plan, { date: SHEET_DAYS.full, edition });
    expect(sheet?.rooms.map((room) => room.room)).toEqual(['Room A']);
    expect(sheet?.rooms[0]!.pages.at(-1)!.meanwhile).toEqual([
      { room: 'Room B', from: '12:00', to: '12:30', says: 'piano tuner' },
      { room: '', from: '19:30', to: '20:00', says: 'supper for all (Mara)' },
    ]);
  });

  it('never puts more than fourteen rows on a page, and ends no page with a lonely mark', () => {
    for (const date of Object.values(SHEET_DAYS))
      for (const room of sheetOf(date).rooms)
        for (const page of room.pages) {
          const rows = page.lines.filter((line) => line.is === 'row').length;
          expect(rows).toBeGreaterThan(0);
          expect(rows).toBeLessThanOrEqual(14);
        }
    expect(sheetOf(SHEET_DAYS.full).rooms[0]!.pages).toHaveLength(2);
  });

  it('says where another date begins', () => {
    const lines = linesOf(sheetOf(SHEET_DAYS.night));
    const midnight = lines.findIndex((line) => line.is === 'midnight');
    expect(lines[midnight]).toEqual({ is: 'midnight', at: '00:00', says: 'Thu 11 March 2027' });
    expect(lines[midnight - 1]).toMatchObject({ from: '23:30', to: '00:30' });
    expect(lines[midnight + 1]).toMatchObject({ is: 'people', at: '00:30', release: ['Petra'] });
  });

  it('keeps the one at the desk out of every row and names them once', () => {
    const sheet = sheetOf(SHEET_DAYS.first);
    expect(sheet.rooms[0]!.facts).toEqual(['open 10:00–20:00', 'loud until 19:00', 'at the desk: Jo']);
    expect(rowsOf(sheet).flatMap((row) => row.people)).not.toContain('Jo');
  });

  it('holds no money', () => {
    for (const figure of ['250', '550', '275', '180', 'EUR', 'fee', 'price'])
      expect(JSON.stringify(Object.values(SHEET_DAYS).map((date) => sheetOf(date).rooms))).not.toContain(figure);
  });

  it('does not exist for a day or a room that the plan does not use', () => {
    expect(runSheet(sheetFile(), sheetPlan(), { date: '2027-03-12', edition })).toBeNull();
    expect(runSheet(sheetFile(), sheetPlan(), { date: SHEET_DAYS.first, room: 'b', edition })).toBeNull();
  });
});
