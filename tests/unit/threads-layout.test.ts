import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { PlanItem } from '../../shared/contracts/plan';
import { planDays, type PlanDay } from '../../shared/planner/day';
import { lineBox } from '../../templates/drawing/labels';
import { layoutDay, leastWidth, TYPE, type DayDrawing, type Rect } from '../../templates/drawing/layout';
import { fitText, textWidth, wrapText } from '../../templates/drawing/text';
import { sampleFile, samplePlan } from '../factories/plan-sample';

const days = (): PlanDay[] => planDays(sampleFile(), samplePlan());
const overlap = (a: Rect, b: Rect): boolean =>
  a.x < b.x + b.width - 0.01 && b.x < a.x + a.width - 0.01 && a.y < b.y + b.height - 0.01 && b.y < a.y + a.height - 0.01;

/** Everything that must hold of any drawing; answers what does not. */
function faultsOf(drawing: DayDrawing, least: number): string[] {
  const faults: string[] = [];
  const labels = drawing.blocks.flatMap((block) => block.label.lines.map((line) => ({ block, line, box: lineBox(line) })));
  for (const { block, line, box } of labels) {
    const text = line.runs.map((run) => run.text).join(' ');
    if (line.size < least) faults.push(`${text} is set in ${line.size}`);
    const inside =
      box.x >= block.x &&
      box.x + box.width <= block.x + block.width + 0.01 &&
      box.y >= block.y - 0.6 &&
      box.y + box.height <= block.y + block.height + 0.6;
    if (!inside) faults.push(`${text} leaves its block`);
    for (const run of line.runs)
      for (const other of line.runs)
        if (run.x < other.x && run.x + textWidth(run.text, line.size, run.bold) > other.x)
          faults.push(`${run.text} runs into ${other.text}`);
    if (block.label.pin && box.x + box.width > block.label.pin.x - 3 && Math.abs(block.label.pin.y - line.y) < 8)
      faults.push(`${text} meets its pin`);
  }
  labels.forEach((one, index) => {
    for (const other of labels.slice(index + 1)) if (overlap(one.box, other.box)) faults.push(`two labels overlap at ${one.box.y}`);
  });
  drawing.blocks.forEach((one, index) => {
    for (const other of drawing.blocks.slice(index + 1)) if (overlap(one, other)) faults.push(`${one.item.key} lies on ${other.item.key}`);
    if (one.x + one.width > drawing.threadsLeft) faults.push(`${one.item.key} reaches the threads`);
  });
  const xs = drawing.threads.map(({ x }) => x);
  if (xs.some((x) => x < drawing.threadsLeft || x > drawing.threadsRight)) faults.push('a thread stands outside');
  for (const name of drawing.names) {
    const length = textWidth(name.text, TYPE.screen.name);
    if (name.x + length * Math.cos((name.angle * Math.PI) / 180) > drawing.width) faults.push(`the name ${name.text} leaves the drawing`);
    if (name.y + length * Math.sin((name.angle * Math.PI) / 180) < 0) faults.push(`the name ${name.text} is cut off above`);
  }
  return faults;
}

describe('a day of presence threads', () => {
  it('draws every item of the plan once, at its time and length', () => {
    const drawn = days().map((day) => ({ day, drawing: layoutDay(day, { mode: 'screen', width: 480 }) }));
    expect(drawn.flatMap(({ drawing }) => drawing.blocks)).toHaveLength(samplePlan().items.length);
    for (const { drawing } of drawn) {
      const hourHeight = drawing.hours[1]!.y - drawing.hours[0]!.y;
      const ten = drawing.hours[0]!;
      expect(ten.label).toBe('10:00');
      for (const block of drawing.blocks) {
        const [hour, minute] = block.item.starts.split(':').map(Number) as [number, number];
        expect(block.y).toBeCloseTo(ten.y + ((hour - 10) * 60 + minute) * (hourHeight / 60), 6);
        expect(block.height).toBeCloseTo(((block.item.to - block.item.from) * hourHeight) / 60 - 1.5, 6);
      }
    }
  });

  it('names everybody, and draws a thread only for those who are called', () => {
    const [monday] = days();
    const drawing = layoutDay(monday!, { mode: 'screen', width: 480 });
    expect(drawing.names.map(({ text, called }) => [text, called])).toEqual([
      ['Mara', true],
      ['Tob', true],
      ['Dov', true],
      ['Petra Montal…', true],
      ['Lys', false],
      ['Jo', false],
    ]);
    expect(drawing.threads.map(({ arrivals }) => arrivals.length)).toEqual([1, 1, 1, 1, 0, 0]);
    expect(drawing.threads.every(({ arrivals, wait, play }) => arrivals.length > 0 || (wait.length === 0 && play.length === 0))).toBe(true);
  });

  it('is thick in passes, medium while getting ready, and broken at a meal', () => {
    const [monday] = days();
    const drawing = layoutDay(monday!, { mode: 'screen', width: 480 });
    const y = (label: string, minutes = 0) =>
      drawing.hours.find((hour) => hour.label === label)!.y + (minutes * (drawing.hours[1]!.y - drawing.hours[0]!.y)) / 60;
    const tobin = drawing.threads[1]!;
    const near = (found: number[], wanted: number[]): void => {
      expect(found).toHaveLength(wanted.length);
      found.forEach((value, index) => expect(value).toBeCloseTo(wanted[index]!, 6));
    };
    near(tobin.arrivals, [y('11:00', 15)]);
    near(
      tobin.ready.map(({ top }) => top - 2),
      [y('11:00', 15)],
    );
    near(
      tobin.play.map(({ top }) => top - 2),
      [y('12:00', 30), y('14:00', 30)],
    );
    // Waiting is what is left thin: here only the line under passes, cut by the meal of 13:45 to 14:30.
    near(
      tobin.wait.flatMap(({ top, bottom }) => [top, bottom]),
      [y('11:00', 15), y('13:00', 45), y('14:00', 30), y('15:00', 45)],
    );
    near(tobin.releases, [y('15:00', 45)]);
  });

  it('shows two rooms beside each other and tells them apart by the shape of the thick stretches', () => {
    const tuesday = days()[1]!;
    const drawing = layoutDay(tuesday, { mode: 'screen', width: 520 });
    expect(drawing.lanes.map(({ title, mark }) => [title, mark])).toEqual([
      ['Room A', 'filled'],
      ['Room B', 'hollow'],
    ]);
    const marks = Object.fromEntries(drawing.threads.map(({ person, play }) => [person, play.map(({ mark }) => mark)]));
    expect(marks).toMatchObject({ lys: ['filled', 'filled'], petra: ['hollow'], jo: ['hollow'], dov: [] });
    const horns = drawing.blocks.find(({ item }) => item.id === 's1-horns')!;
    const organ = drawing.blocks.find(({ item }) => item.id === 's3-organ')!;
    expect(horns.x + horns.width).toBeLessThan(organ.x);
    expect(horns.wash).toBeLessThan(horns.width + 1);
  });

  it('splits a thread where somebody has time off', () => {
    const tuesday = days()[1]!;
    const lys = layoutDay(tuesday, { mode: 'screen', width: 520 }).threads.find(({ person }) => person === 'lys')!;
    expect(lys.arrivals).toHaveLength(2);
    expect(lys.releases).toHaveLength(2);
  });

  it('keeps all labels inside their blocks and apart, on screen and in print, at its least width and wider', () => {
    for (const mode of ['screen', 'print'] as const)
      for (const day of days())
        for (const width of [leastWidth(day, mode), 345, 520, 718].filter((wide) => wide >= leastWidth(day, mode)))
          expect(faultsOf(layoutDay(day, { mode, width }), TYPE[mode].least)).toEqual([]);
  });

  it('holds for any day: many people, long names, short items, any script', () => {
    const name = fc.oneof(
      fc.constantFrom('Mara', 'Wolfeschlegelsteinhausen', '雨宮 さくら', 'مها', '🪕 Ole', 'J'),
      fc.string({ minLength: 1, maxLength: 40 }),
    );
    const script = fc.record({
      names: fc.array(name, { minLength: 1, maxLength: 16 }),
      lengths: fc.array(fc.constantFrom(10, 15, 20, 30, 45, 75, 150), { minLength: 1, maxLength: 12 }),
      title: name,
      rooms: fc.integer({ min: 1, max: 3 }),
      pinned: fc.boolean(),
    });
    fc.assert(
      fc.property(script, ({ names, lengths, title, rooms, pinned }) => {
        const date = '2027-03-08';
        const roomIds = Array.from({ length: rooms }, (_, index) => `r${index}`);
        const passes = lengths.map((minutes, index) => ({
          id: `p${index}`,
          song: 's',
          name: index % 2 === 0 ? title : undefined,
          people: names.map((_, who) => `n${who}`).filter((_, who) => (who + index) % 3 !== 0),
          room: roomIds[index % rooms]!,
          minutes,
          ...(pinned ? { pin: { day: date } } : {}),
        }));
        let at = 600;
        const items: PlanItem[] = passes.map((pass) => {
          const wall = (minute: number) =>
            `${date}T${String(Math.floor(minute / 60)).padStart(2, '0')}:${String(minute % 60).padStart(2, '0')}`;
          const start = at;
          at += pass.minutes;
          return { kind: 'pass', id: pass.id, room: pass.room, start: wall(start), end: wall(at), people: pass.people };
        });
        fc.pre(at < 24 * 60);
        const open = [{ from: `${date}T10:00`, to: `${date}T23:59` }];
        const file = {
          ...sampleFile(),
          rooms: roomIds.map((id) => ({ id, name: `Room ${id}`, open })),
          people: names.map((short, who) => ({ id: `n${who}`, short, name: short })),
          songs: [{ id: 's', code: 'S1', title }],
          passes,
        };
        const calls = file.people.map(({ id }) => ({
          person: id,
          date,
          arrive: items[0]!.start,
          ready: items[0]!.start,
          release: items.at(-1)!.end,
          working: 0,
          waiting: 0,
        }));
        const day = planDays(file, { items, calls })[0]!;
        const width = Math.max(345, leastWidth(day, 'screen'));
        const drawing = layoutDay(day, { mode: 'screen', width });
        expect(drawing.blocks).toHaveLength(items.length);
        expect(drawing.threads).toHaveLength(names.length);
        expect(faultsOf(drawing, TYPE.screen.least)).toEqual([]);
      }),
      { numRuns: 200 },
    );
  });
});

describe('text without a browser', () => {
  it('cuts what is too long and says so by an ellipsis', () => {
    expect(fitText('Petra', 100, 12)).toBe('Petra');
    const cut = fitText('The Long Way Round', 60, 12);
    expect(cut).toMatch(/…$/);
    expect(textWidth(cut, 12)).toBeLessThanOrEqual(60);
    expect(fitText('Petra', 2, 12)).toBe('');
  });

  it('breaks lines at spaces, no line wider than asked', () => {
    const lines = wrapText('The Long Way Round to Low Lamps and Back Again', 110, 14, 3, 30);
    expect(lines.length).toBe(3);
    expect(lines.map((line) => textWidth(line, 14)).every((width, index) => width <= (index === 0 ? 80 : 110))).toBe(true);
  });
});
