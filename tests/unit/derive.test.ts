import { describe, expect, it } from 'vitest';
import type { Part, ProductionFile, Song } from '../../shared/contracts/resources';
import { basicsMinutes, overdubMinutes } from '../../shared/domain/durations';
import { effectivePasses } from '../../shared/planner/derive';

function fileWith(songs: Song[], more: Partial<ProductionFile> = {}): ProductionFile {
  return {
    production: { code: 'TEST', title: 'Test', timezone: 'Europe/Lisbon' },
    rooms: [
      { id: 'a', open: [] },
      { id: 'b', open: [] },
    ],
    people: [],
    gear: [],
    setups: [
      { id: 'full-kit', room: 'a' },
      { id: 'brushes', room: 'a' },
    ],
    changeovers: [],
    songs,
    events: [],
    ...more,
  };
}
const live = (id: string, more: Partial<Part> = {}): Part => ({ id, mode: 'live', players: [id], ...more });

describe('derived passes', () => {
  it('live and guide parts are one pass, every other part its own after it', () => {
    const passes = effectivePasses(
      fileWith([
        {
          id: 's1',
          priority: 'should',
          minutes: 65,
          parts: [
            live('drums'),
            { id: 'guide', mode: 'guide', players: ['mara'] },
            { id: 'lead', mode: 'overdub', players: ['mara'], minutes: [60, 80, 120] },
          ],
        },
      ]),
    );
    expect(passes).toEqual([
      {
        id: 's1-basics',
        song: 's1',
        parts: ['drums', 'guide'],
        people: ['drums', 'mara'],
        room: 'a',
        setup: 'full-kit',
        minutes: 65,
        priority: 'should',
      },
      {
        id: 's1-lead',
        song: 's1',
        parts: ['lead'],
        people: ['mara'],
        room: 'a',
        setup: 'full-kit',
        minutes: [60, 80, 120],
        priority: 'should',
        after: [{ pass: 's1-basics', kind: 'captured' }],
      },
    ]);
  });

  it('parts together last as long as the longest; their gear and singing add up; each player counts once', () => {
    const [basics] = effectivePasses(
      fileWith([
        {
          id: 's1',
          parts: [
            live('piano', { minutes: [50, 60, 100], uses: [{ gear: 'organ' }], players: ['petra'] }),
            live('voice', { minutes: 70, voice: { petra: 20 }, uses: [{ gear: 'organ', count: 2 }], players: ['petra', 'mara'] }),
            live('shout', { voice: { petra: 5 }, quiet: true, priority: 'nice' }),
          ],
        },
      ]),
    );
    expect(basics).toMatchObject({
      minutes: [70, 70, 100],
      uses: [{ gear: 'organ', count: 3 }],
      voice: { petra: 25 },
      people: ['petra', 'mara', 'shout'],
      quiet: true,
      priority: 'must',
    });
  });

  it('a part in the small room does not ask for the drum kit of its song', () => {
    const [basics, overdub] = effectivePasses(
      fileWith([{ id: 's1', setup: 'brushes', parts: [live('drums'), { id: 'keys', mode: 'overdub', room: 'b' }] }]),
    );
    expect(basics).toMatchObject({ room: 'a', setup: 'brushes' });
    expect(overdub).toMatchObject({ room: 'b' });
    expect(overdub).not.toHaveProperty('setup');
  });

  it('a song of overdubs only waits for nothing, and a part without a mode is not recorded', () => {
    const passes = effectivePasses(fileWith([{ id: 's1', parts: [{ id: 'lead', mode: 'overdub' }, { id: 'maybe' }] }]));
    expect(passes.map((pass) => pass.id)).toEqual(['s1-lead']);
    expect(passes[0]).not.toHaveProperty('after');
  });

  it('a stronger wait of a part is kept and not doubled', () => {
    const passes = effectivePasses(
      fileWith([
        {
          id: 's1',
          parts: [live('drums'), { id: 'lead', mode: 'overdub', after: [{ pass: 's1-basics', kind: 'approved' }] }],
        },
      ]),
    );
    expect(passes[1]?.after).toEqual([{ pass: 's1-basics', kind: 'approved' }]);
  });
});

describe('written passes', () => {
  it('are planned as they are, with the room of their set-up and the priority of their song', () => {
    const passes = effectivePasses(
      fileWith([{ id: 's1', priority: 'nice', parts: [live('drums')] }], {
        passes: [
          { id: 'p1', song: 's1', setup: 'brushes', minutes: 30 },
          { id: 'p2', room: 'b', minutes: 30 },
        ],
      }),
    );
    expect(passes).toEqual([
      { id: 'p1', song: 's1', setup: 'brushes', minutes: 30, room: 'a', priority: 'nice' },
      { id: 'p2', room: 'b', minutes: 30, priority: 'must' },
    ]);
  });

  it('an empty list means that nothing is planned', () => {
    expect(effectivePasses(fileWith([{ id: 's1', parts: [live('drums')] }], { passes: [] }))).toEqual([]);
  });
});

/** Ranges by common practice, no published source: see the table beside the code. */
describe('usual durations', () => {
  it.each([
    [4, 45, 75],
    [3, 45, 75],
    [2, 90, 150],
  ])('basics at rehearsal level %i take %i to %i minutes', (level, least, most) => {
    for (const length of [undefined, 2.5, 4.2, 5]) {
      const [low, likely, high] = basicsMinutes(level, length);
      expect(likely).toBeGreaterThanOrEqual(least);
      expect(likely).toBeLessThanOrEqual(most);
      expect(low).toBeLessThan(likely);
      expect(high).toBeGreaterThan(likely);
    }
  });

  it('a slot is run-through, takes, playbacks and fixes: level 3, 4.2 minutes of music', () => {
    // 10 + 4 × (4.2 + 2.5) + 1.2 × 4.2 × 1.5 + 12.5 = 56.86
    expect(basicsMinutes(3, 4.2)[1]).toBe(55);
  });

  it.each([
    ['lead vocal', 45, 120],
    ['acoustic guitar', 30, 45],
    ['bass guitar', 30, 45],
    ['lead guitar', 45, 75],
    ['organ', 30, 45],
    ['horn section', 40, 60],
    ['sax solo', 20, 30],
    ['percussion', 10, 15],
    ['theremin', 30, 60],
    ['声', 30, 60],
  ])('an overdub of %s takes %i to %i minutes', (instrument, least, most) => {
    const [, likely] = overdubMinutes('overdub', instrument);
    expect(likely).toBeGreaterThanOrEqual(least);
    expect(likely).toBeLessThanOrEqual(most);
  });

  it('a double takes about two thirds of its first pass', () => {
    const first = overdubMinutes('overdub', 'lead vocal')[1];
    const double = overdubMinutes('double', 'lead vocal')[1];
    expect(double / first).toBeGreaterThan(0.55);
    expect(double / first).toBeLessThan(0.75);
  });
});
