// @vitest-environment happy-dom
import { mount } from '@vue/test-utils';
import { describe, expect, it } from 'vitest';
import { planDays } from '../../shared/planner/day';
import { arrangeDays, DAY_GAP } from '../../src/components/plan/arrange';
import { dayInWords, stepFrom, threadsInWords } from '../../src/components/plan/navigation';
import PlanDayColumn from '../../src/components/plan/PlanDayColumn.vue';
import PresenceThreads from '../../templates/drawing/PresenceThreads.vue';
import { leastWidth } from '../../templates/drawing/layout';
import { sampleFile, samplePlan } from '../factories/plan-sample';

const days = planDays(sampleFile(), samplePlan());
const [monday, tuesday] = days as [(typeof days)[0], (typeof days)[0]];

describe('the drawing', () => {
  it('is a picture of plain shapes that says everything without classes or colour', () => {
    const drawing = mount(PresenceThreads, { props: { day: tuesday, mode: 'print', width: 718, selected: null } });
    const svg = drawing.get('svg');
    expect(svg.attributes('aria-hidden')).toBe('true');
    expect(drawing.findAll('[class], [style]')).toEqual([]);
    const text = drawing.text();
    for (const words of ['horns', 'organ', 'trumpet solo', 'Room A', 'Room B', 'Lys', 'Petra Mont', 'Jo', '13:00', '13:00–13:50'])
      expect(text).toContain(words);
    // Every colour has a fallback for paper, where no theme is set.
    const colours = drawing.findAll('*').flatMap((one) => [one.attributes('fill'), one.attributes('stroke')]);
    expect(colours.filter((colour) => colour !== undefined && !/^(none|var\(--\w+, #\w+\))$/.test(colour))).toEqual([]);
  });

  it('rings arrivals, bars releases, and frames the selected pass', async () => {
    const drawing = mount(PresenceThreads, { props: { day: monday, mode: 'screen', width: 480, selected: null } });
    expect(drawing.findAll('circle[r="4.2"]')).toHaveLength(4);
    const frames = () => drawing.findAll('rect').filter((rect) => rect.attributes('stroke')?.includes('--focus'));
    expect(frames()).toHaveLength(0);
    await drawing.setProps({ selected: monday.items.find(({ id }) => id === 's2-basics')!.key });
    expect(frames()).toHaveLength(1);
  });
});

describe('a day on the page', () => {
  const column = () => mount(PlanDayColumn, { props: { day: monday, width: 480, selected: null, reachable: 's1-basics', landing: null } });

  it('lists its passes for the keyboard, one of them reachable by Tab, each read out in full', () => {
    const options = column().findAll('[role="option"]');
    expect(options.map((option) => option.attributes('aria-label'))).toEqual([
      'S1 Weir Song, 12:30 to 13:45, Room A, Mara, Tob, Dov, Petra Montalvo; pinned',
      'S2 The Long Way Round to Low Lamps and Back Again, 14:30 to 15:45, Room A, Tob, Dov',
    ]);
    expect(options.map((option) => option.attributes('tabindex'))).toEqual(['0', '-1']);
  });

  it('lays each pass over its block, and tells who was chosen', async () => {
    const wrapper = column();
    const [first, second] = wrapper.findAll('[role="option"]');
    const top = (option: typeof first) => Number.parseFloat((option!.element as HTMLElement).style.top);
    // Two hours lie between their starts, at 0.92 px a minute.
    expect(top(second) - top(first)).toBeCloseTo(120 * 0.92, 3);
    await second!.trigger('focus');
    await second!.trigger('click');
    expect(wrapper.emitted('select')).toEqual([['s2-basics']]);
    expect(wrapper.emitted('open')).toEqual([['s2-basics']]);
  });

  it('reads out rigs, meals and threads to those who do not see them', () => {
    const text = column().get('ul').text();
    expect(text).toContain('Rig: Full kit, 10:00 to 12:30');
    expect(text).toContain('Meal, 13:45 to 14:30');
    expect(text).toContain('Tob arrives 11:15, leaves 15:45');
    expect(threadsInWords(tuesday)).toContain('Lys arrives 13:00, leaves 13:50');
  });

  it('says an empty day is not needed', () => {
    const empty = planDays(sampleFile(), { items: [], calls: [] })[0]!;
    const wrapper = mount(PlanDayColumn, { props: { day: empty, width: 150, selected: null, reachable: null, landing: null } });
    expect(wrapper.text()).toContain('Not needed by this plan. Free: Room A 10:00–20:00.');
  });

  it('joins rooms with the same hours in one phrase', () => {
    expect(dayInWords(tuesday)).toBe('Room A 10:00–20:00, loud until 19:00 · Room B 10:00–20:00 · Lys 13:00–17:00');
    const alike = { ...tuesday, rooms: tuesday.rooms.map((room) => ({ ...room, loudUntil: null })) };
    expect(dayInWords(alike)).toBe('Room A and Room B 10:00–20:00 · Lys 13:00–17:00');
  });
});

describe('arrows between passes', () => {
  it('go up and down in time and left and right to the nearest time of another day', () => {
    expect(stepFrom(days, 's1-basics', 'down')).toBe('s2-basics');
    expect(stepFrom(days, 's2-basics', 'down')).toBe(null);
    expect(stepFrom(days, 's2-basics', 'up')).toBe('s1-basics');
    expect(stepFrom(days, 's1-basics', 'right')).toBe('s1-horns');
    expect(stepFrom(days, 's3-solo', 'left')).toBe('s2-basics');
    expect(stepFrom(days, 's1-basics', 'left')).toBe(null);
    expect(stepFrom(days, 's1-horns', 'first')).toBe('s2-repair');
    expect(stepFrom(days, 's1-horns', 'last')).toBe('s3-solo');
    expect(stepFrom(days, 'unknown', 'up')).toBe(null);
  });
});

describe('days side by side', () => {
  it('fills rows in order, never wider than the page, never narrower than can be read', () => {
    const many = Array.from({ length: 7 }, (_, index) => days[index % 2]!);
    for (const width of [700, 1080, 1720, 2400]) {
      const rows = arrangeDays(many, width);
      expect(rows.flat().map(({ day }) => day)).toEqual(many);
      for (const row of rows) {
        expect(row.reduce((sum, one) => sum + one.width, DAY_GAP * (row.length - 1))).toBeLessThanOrEqual(width);
        for (const one of row) expect(one.width).toBeGreaterThanOrEqual(leastWidth(one.day, 'screen'));
      }
    }
  });

  it('sets three days of one room in a row at 1280 px, with nine people', () => {
    const file = sampleFile();
    file.people = Array.from({ length: 9 }, (_, index) => ({ id: index === 0 ? 'mara' : `p${index}`, short: `Name ${index}` }));
    const day = planDays(file, { items: samplePlan().items.filter(({ start }) => start < '2027-03-09'), calls: [] })[0]!;
    const rows = arrangeDays([day, day, day], 1280 - 148 - 52);
    expect(rows).toHaveLength(1);
    expect(rows[0]!.map(({ width }) => width)).toEqual([345, 345, 345]);
  });
});
