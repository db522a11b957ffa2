import { describe, expect, it } from 'vitest';
import { calledPeople, callSheet } from '../../shared/domain/sheets/call-sheet';
import { documentName } from '../../shared/domain/sheets/file-names';
import type { CallDay, CallSheet } from '../../shared/domain/sheets/sheet';
import { sheetFile, sheetPlan } from '../factories/sheet-sample';

const edition = { version: 3, printed: '2026-12-01T14:30' };
function sheetOf(person: string): CallSheet {
  const sheet = callSheet(sheetFile(), sheetPlan(), { person, edition });
  if (!sheet) throw new Error('no sheet');
  return sheet;
}
const daysOf = (sheet: CallSheet): CallDay[] => sheet.pages.flatMap((page) => page.days);
const factsOf = (sheet: CallSheet) => Object.fromEntries(sheet.pages.flatMap((page) => page.facts).map(({ label, says }) => [label, says]));

describe('the call sheet of a person', () => {
  it('gives every date with the times to arrive, to be ready and to go', () => {
    const days = daysOf(sheetOf('tobin'));
    expect(days.map(({ day, count, room, arrive, ready }) => [day, count, room, arrive, ready])).toEqual([
      ['Mon 8 March 2027', 'day 1 of 3', 'Room A', '11:45', '13:00'],
      ['Tue 9 March 2027', 'day 2 of 3', 'Room A', '11:15', '11:15'],
    ]);
  });

  it('spreads the release by the low and high minutes of the passes before it, outwards on the grid', () => {
    // Three passes of [50, 65, 100]: √(3·15²) = 26 → 30 min early, √(3·35²) = 60.6 → 65 min late.
    expect(daysOf(sheetOf('tobin'))[0]!.release).toEqual({ earliest: '16:45', likely: '17:15', latest: '18:20' });
  });

  it('never says later than the person or the room can be there', () => {
    // Planned until 16:55, free until 17:00.
    expect(daysOf(sheetOf('lys'))[0]!.release.latest).toBe('17:00');
  });

  it('lists what the person plays with part, key, capo, tuning, pitch, tempo, click and what it needs', () => {
    const [day] = daysOf(sheetOf('oka'));
    const line = (code: string) => day!.lines.find((one) => one.code === code);
    expect(line('S1')).toEqual({
      kind: 'pass',
      from: '13:30',
      to: '14:10',
      code: 'S1',
      title: 'Weir Song',
      part: 'horns, overdub',
      key: 'D',
      tempo: '96 · 4/4 · click',
      note: 'needs chart',
    });
    expect(line('S2')).toMatchObject({ key: 'Am · A = 442', tempo: '72 · 6/8 · no click' });
    expect(line('S3')).toMatchObject({ key: 'G · capo 2 · DADGAD' });
    expect(line('S4')).toMatchObject({ part: 'gang vocal', tempo: 'free, about 84' });
  });

  it('shows getting ready, meals and long gaps, so that nobody wonders where the time goes', () => {
    const [monday, tuesday] = daysOf(sheetOf('tobin'));
    expect(monday!.lines[0]).toMatchObject({ kind: 'other', from: '11:45', to: '13:00', title: 'Set up and line check' });
    expect(tuesday!.lines.map((line) => [line.from, line.to, line.title])).toContainEqual(['13:30', '14:50', 'free, 1 h 20']);
    expect(tuesday!.lines.map((line) => line.title)).toContain('Meal');
  });

  it('keeps an event that is in no room', () => {
    const [, tuesday] = daysOf(sheetOf('mara'));
    expect(tuesday!.lines.at(-1)).toMatchObject({ from: '19:30', to: '20:00', title: 'supper for all' });
  });

  it('names the room of each line where the day has several', () => {
    const [tuesday] = daysOf(sheetOf('petra'));
    expect(tuesday!.room).toBe('Room A, Room B');
    expect(tuesday!.lines.find((line) => line.code === 'S3')).toMatchObject({ note: 'Room B' });
  });

  it('says that a release lies after midnight', () => {
    expect(daysOf(sheetOf('petra')).map((day) => [day.release.likely, day.overnight])).toEqual([
      ['16:55', false],
      ['00:30', true],
    ]);
  });

  it('tells where to come, what to bring and whom to ring', () => {
    expect(factsOf(sheetOf('mara'))).toEqual({
      Where: 'Kiln Yard, 4 Ropery Lane, by the old lime kiln',
      Door: 'green door in the yard, bell marked “Studio”',
      Parking: 'two spaces behind the kiln; vans may unload at the gate',
      Phone: '+00 555 0100',
      'Late?': 'Ring Jo, +00 555 0101',
      Bring: 'acoustic guitar, spare strings, capo, tea',
      Wear: 'Quiet: soft shoes, nothing that rustles, no jewellery that sounds.',
      Food: 'no nuts',
      Headphones: 'one ear off',
      Ears: 'Loud work: bring ear protection, start with the headphones turned down.',
      Voice:
        'Mon 8 March about 45 min, Tue 9 March about 30 min, Wed 10 March about 40 min of singing. Warm up, keep water by you, rest between takes.',
    });
    expect(factsOf(sheetOf('petra')).Access).toBe('step-free entrance, chair with back');
  });

  it('holds nobody else’s facts and no money', () => {
    const dov = JSON.stringify(sheetOf('dov'));
    for (const foreign of ['no nuts', 'spare strings', 'step-free', '250', '550', 'EUR']) expect(dov).not.toContain(foreign);
    expect(JSON.stringify(sheetOf('mara'))).not.toContain('250');
  });

  it('exists for those whom the plan calls, in the order of the production', () => {
    expect(calledPeople(sheetFile(), sheetPlan())).toEqual(['mara', 'tobin', 'dov', 'petra', 'oka', 'lys', 'jo']);
    expect(callSheet(sheetFile(), sheetPlan(), { person: 'nobody', edition })).toBeNull();
  });
});

describe('names of documents', () => {
  it('are capital letters, digits and hyphens whatever the code is', () => {
    expect(documentName({ code: 'SLUICE', version: 3, date: '2027-03-08' }, 'RUN-SHEET.pdf')).toBe('SLUICE_V3_2027-03-08_RUN-SHEET.pdf');
    expect(documentName({ code: 'Café / 9 🏮', version: null, person: 'mara-q' }, 'CALL-SHEET.pdf')).toBe(
      'CAFE-9_DRAFT_MARA-Q_CALL-SHEET.pdf',
    );
    expect(documentName({ code: '水門', version: 1 }, 'BOOK.pdf')).toBe('PRODUCTION_V1_BOOK.pdf');
  });
});
