import { describe, expect, it } from 'vitest';
import type { ProductionFile } from '../../shared/contracts/resources';
import { type CellEdit, changesForCell } from '../../shared/domain/ledger';
import { changesForColumnName, changesForColumnRemoval, changesForNewSong, changesForSongRemoval } from '../../shared/domain/ledgerSongs';
import { columnsInOrder, ledgerOf } from '../../shared/domain/ledgerTable';
import { edited, smallBand, writtenBand } from '../factories/band';

const cell = (file: ProductionFile, song: string, part: string, wanted: CellEdit) => edited(file, changesForCell(file, song, part, wanted));
const passOf = (file: ProductionFile, id: string) => file.passes?.find((pass) => pass.id === id);
const partsOf = (file: ProductionFile, song: string) => file.songs.find(({ id }) => id === song)?.parts ?? [];

describe('the ledger as a table', () => {
  it('puts parts that later songs add after the part they follow there', () => {
    const file = smallBand();
    file.songs[1]?.parts?.unshift({ id: 'fiddle', name: 'Fiddle', mode: 'live', players: ['oka'] });
    file.songs[1]?.parts?.push({ id: 'shaker', name: 'Shaker', mode: 'overdub', players: ['tobin'] });
    expect(ledgerOf(file).columns.map(({ name }) => name)).toEqual(['Drums', 'Lead', 'Shaker', 'Sax', 'Trumpet', 'Fiddle']);
  });

  it('shows the minutes of a pass once, under the part that leads it, and sums them', () => {
    const ledger = ledgerOf(writtenBand());
    const row = ledger.rows[0];
    expect(row?.cells.get('drums')?.minutes).toEqual([40, 60, 90]);
    expect(row?.cells.get('lead')?.minutes).toBeNull();
    expect(row?.cells.get('lead')?.together).toEqual(['Drums']);
    expect(row?.cells.get('sax')?.minutes?.[1]).toBe(45);
    expect(row?.minutes).toBe(105);
    expect(ledger.minutes).toBe(180);
    expect(ledger.columns.map(({ minutes }) => minutes)).toEqual([60, 75, 45, 0]);
  });

  it('says what wants to be looked at: a part without a player, an overdub on a free tempo, a song nobody has played', () => {
    const file = smallBand();
    file.songs[1]?.parts?.push({ id: 'shaker', name: 'Shaker', mode: 'overdub', players: ['tobin'] });
    file.songs[0]?.parts?.push({ id: 'gong', name: 'Gong', mode: 'live' });
    file.songs[0]!.rehearsal = 1;
    const [first, second] = ledgerOf(file).rows;
    expect(second?.cells.get('shaker')?.alarm).toBe('no map');
    expect(first?.cells.get('gong')?.alarm).toBe('nobody');
    expect(first?.cells.get('drums')?.alarm).toBeNull();
    expect(first?.alarm).toBe('rehearse first');
  });

  it('lets no column move or vanish while somebody types', () => {
    const named = (...keys: string[]) => keys.map((key) => ({ key }));
    const keys = (columns: { key: string }[]) => columns.map(({ key }) => key).join(' ');
    expect(keys(columnsInOrder(named('drums', 'fiddle', 'lead'), named('drums', 'lead', 'fiddle')))).toBe('drums fiddle lead');
    expect(keys(columnsInOrder(named('drums', 'lead'), named('drums', 'bass', 'lead')))).toBe('drums bass lead');
    expect(keys(columnsInOrder(named('drums', 'fiddle', 'lead'), named('drums', 'lead')))).toBe('drums fiddle lead');
    expect(keys(columnsInOrder(named('drums', 'drums'), []))).toBe('drums');
    expect(keys(columnsInOrder([], named('a', 'b')))).toBe('a b');
  });

  it('keeps two parts of one name apart', () => {
    const file = smallBand();
    file.songs[0]?.parts?.push({ id: 'sax-2', name: 'Sax', mode: 'double', players: ['oka'] });
    expect(ledgerOf(file).columns.map(({ key }) => key)).toContain('sax 2');
    expect(changesForCell(file, 's1', 'Sax 2', { mode: 'stack' })[0]?.key).toBe('s1/sax-2');
  });
});

describe('a cell where passes are derived', () => {
  it('makes the part with the players who play it elsewhere, and nothing else', () => {
    const edits = changesForCell(smallBand(), 's2', 'drums', { mode: 'overdub' });
    expect(edits).toEqual([
      { resource: 'parts', key: 's2/drums', op: 'create', fields: { name: 'Drums', mode: 'overdub', players: ['tobin'] } },
    ]);
  });

  it('takes the part away, with what other parts said about its derived pass', () => {
    const file = smallBand();
    partsOf(file, 's1')[3]!.after = [{ pass: 's1-sax', kind: 'approved' }, { pass: 's1-basics' }];
    const after = cell(file, 's1', 'Sax', { mode: null });
    expect(partsOf(after, 's1').map(({ id }) => id)).toEqual(['drums', 'lead', 'trumpet']);
    expect(partsOf(after, 's1')[2]?.after).toEqual([{ pass: 's1-basics' }]);
  });

  it('brings a part back with all it had', () => {
    const file = smallBand();
    const sax = partsOf(file, 's1')[2]!;
    const without = cell(file, 's1', 'Sax', { mode: null });
    const back = edited(without, changesForCell(without, 's1', 'Sax', { mode: 'double' }, sax));
    expect(partsOf(back, 's1').find(({ id }) => id === 'sax')).toEqual({ ...sax, mode: 'double' });
  });

  it('moves the range with the likely minutes', () => {
    const after = cell(smallBand(), 's1', 'Sax', { minutes: 60 });
    expect(partsOf(after, 's1')[2]?.minutes).toEqual([40, 60, 95]);
  });

  it('changes nothing for a song that is not there, a mode that is there, a removal of nothing', () => {
    expect(changesForCell(smallBand(), 's9', 'Drums', { mode: 'live' })).toEqual([]);
    expect(changesForCell(smallBand(), 's1', 'Drums', { mode: 'live' })).toEqual([]);
    expect(changesForCell(smallBand(), 's2', 'Drums', { mode: null })).toEqual([]);
    expect(changesForCell(smallBand(), 's2', 'Drums', { minutes: 20 })).toEqual([]);
  });
});

describe('a cell where passes are written', () => {
  it('lets a new live part join the basics, with its players', () => {
    const file = writtenBand();
    const after = cell(file, 's2', 'Drums', { mode: 'live' });
    expect(passOf(after, 's2-basics')).toMatchObject({ parts: ['lead', 'drums'], people: ['mara', 'tobin'], minutes: 75 });
  });

  it('gives a new overdub a pass of its own after the basics', () => {
    const after = cell(writtenBand(), 's2', 'Drums', { mode: 'overdub' });
    expect(passOf(after, 's2-drums')).toMatchObject({
      song: 's2',
      parts: ['drums'],
      people: ['tobin'],
      after: [{ pass: 's2-basics', kind: 'captured' }],
    });
  });

  it('follows basics that go by another name', () => {
    const file = writtenBand();
    file.passes = [{ id: 'ropewalk-live', song: 's2', parts: ['lead'], people: ['mara'], minutes: 75 }];
    expect(passOf(cell(file, 's2', 'Drums', { mode: 'overdub' }), 's2-drums')?.after).toEqual([
      { pass: 'ropewalk-live', kind: 'captured' },
    ]);
  });

  it('takes a part and its player out of a shared pass, and leaves the rest as it was written', () => {
    const after = cell(writtenBand(), 's1', 'Lead', { mode: null });
    expect(passOf(after, 's1-basics')).toMatchObject({ parts: ['drums'], people: ['tobin'], note: 'loud one first', setup: 'kit' });
  });

  it('removes a pass that held nothing else, and what other passes said about it', () => {
    const file = writtenBand();
    const first = cell(file, 's1', 'Sax', { mode: null });
    expect(passOf(first, 's1-horns')).toMatchObject({ parts: ['trumpet'], people: ['lys'] });
    const second = cell(first, 's1', 'Trumpet', { mode: null });
    expect(passOf(second, 's1-horns')).toBeUndefined();
    expect(passOf(second, 's2-basics')?.after).toBeUndefined();
    expect(passOf(second, 's2-basics')?.apart).toBeUndefined();
  });

  it('moves a part from the basics to a pass of its own when it is to be overdubbed', () => {
    const after = cell(writtenBand(), 's1', 'Lead', { mode: 'overdub' });
    expect(passOf(after, 's1-basics')).toMatchObject({ parts: ['drums'], people: ['tobin'] });
    expect(passOf(after, 's1-lead')).toMatchObject({ parts: ['lead'], people: ['mara'], after: [{ pass: 's1-basics', kind: 'captured' }] });
  });

  it('moves the only live part of a song: its basics go, and nothing names them any more', () => {
    const after = cell(writtenBand(), 's2', 'Lead', { mode: 'overdub' });
    expect(passOf(after, 's2-basics')).toBeUndefined();
    expect(passOf(after, 's2-lead')).toMatchObject({ parts: ['lead'], people: ['mara'] });
    expect(passOf(after, 's2-lead')?.after).toBeUndefined();
  });

  it('moves an overdub into the basics when it is to be played live', () => {
    const after = cell(writtenBand(), 's1', 'Sax', { mode: 'live' });
    expect(passOf(after, 's1-basics')).toMatchObject({ parts: ['drums', 'lead', 'sax'], people: ['tobin', 'mara', 'oka'] });
    expect(passOf(after, 's1-horns')).toMatchObject({ parts: ['trumpet'], people: ['lys'] });
  });

  it('keeps the minutes of a pass and of the part that leads it the same', () => {
    const after = cell(writtenBand(), 's1', 'Lead', { minutes: 90 });
    expect(passOf(after, 's1-basics')?.minutes).toEqual([60, 90, 135]);
    expect(partsOf(after, 's1')[0]?.minutes).toEqual([60, 90, 135]);
    expect(ledgerOf(after).rows[0]?.cells.get('drums')?.minutes?.[1]).toBe(90);
  });

  it('lets minutes of a pass follow a new mode only where they were the usual ones', () => {
    const file = writtenBand();
    const alone = cell(file, 's2', 'Drums', { mode: 'overdub' });
    const usual = passOf(alone, 's2-drums')?.minutes;
    expect(passOf(cell(alone, 's2', 'Drums', { mode: 'repair' }), 's2-drums')?.minutes).not.toEqual(usual);
    const own = cell(alone, 's2', 'Drums', { minutes: 33 });
    const repaired = cell(own, 's2', 'Drums', { mode: 'repair' });
    expect(passOf(repaired, 's2-drums')?.minutes).toEqual(passOf(own, 's2-drums')?.minutes);
  });

  it('sends a new player to the pass and lets the one before go, unless another part holds them', () => {
    const file = writtenBand();
    const after = cell(file, 's1', 'Sax', { fields: { players: ['mara'] } });
    expect(passOf(after, 's1-horns')?.people).toEqual(['lys', 'mara']);
    const both = cell(file, 's1', 'Trumpet', { fields: { players: ['lys', 'oka'] } });
    expect(passOf(cell(both, 's1', 'Sax', { fields: { players: [] } }), 's1-horns')?.people).toEqual(['oka', 'lys']);
  });

  it('hands room, priority and the like to a pass of that part alone, never to a shared one', () => {
    const file = writtenBand();
    expect(passOf(cell(file, 's1', 'Sax', { fields: { priority: 'nice' } }), 's1-horns')?.priority).toBeUndefined();
    expect(passOf(cell(file, 's2', 'Lead', { fields: { priority: 'nice', quiet: true } }), 's2-basics')).toMatchObject({
      priority: 'nice',
      quiet: true,
    });
  });
});

describe('rows and columns', () => {
  it('gives a new song the next code and a free id', () => {
    const { id, edits } = changesForNewSong(smallBand(), 'Ångström Blues');
    expect(id).toBe('angstrom-blues');
    expect(edits[0]?.fields).toEqual({ code: 'S03', title: 'Ångström Blues' });
    expect(changesForNewSong(smallBand(), '雨').id).toBe('song');
  });

  it('removes a song with its parts and passes, and what other passes said about them', () => {
    const file = writtenBand();
    const after = edited(file, changesForSongRemoval(file, 's1'));
    expect(after.songs.map(({ id }) => id)).toEqual(['s2']);
    expect(after.passes?.map(({ id }) => id)).toEqual(['s2-basics']);
    expect(after.passes?.[0]?.after).toBeUndefined();
  });

  it('renames and removes a column in every song', () => {
    const file = writtenBand();
    const renamed = edited(file, changesForColumnName(file, 'lead', 'Lead voice'));
    expect(ledgerOf(renamed).columns.map(({ name }) => name)).toEqual(['Drums', 'Lead voice', 'Sax', 'Trumpet']);
    const removed = edited(file, changesForColumnRemoval(file, 'lead'));
    expect(ledgerOf(removed).columns.map(({ name }) => name)).toEqual(['Drums', 'Sax', 'Trumpet']);
    expect(removed.passes?.map(({ id }) => id)).toEqual(['s1-basics', 's1-horns']);
  });
});
