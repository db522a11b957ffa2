import type { Rules } from '../../shared/contracts/head';
import type { Pass, ProductionFile } from '../../shared/contracts/resources';

/** A rule that asks for nothing. */
const FREE: Required<Omit<Rules, 'listen'>> = {
  step: 1,
  mealAfter: 1_000_000,
  meal: 0,
  breakAfter: 0,
  break: 0,
  wrap: 0,
  reserve: 0,
  turnaround: 0,
  changeover: 0,
  oneRoomPerSong: false,
};

/** The file as somebody would edit it to take one fact of a clash back. A room without hours is open around the clock. */
export function dropFact(file: ProductionFile, fact: string): ProductionFile {
  const [list, id = '', field] = fact.split('.') as [keyof ProductionFile | 'rules', string, string | undefined];
  const lists = file as unknown as Record<string, { id: string }[]>;
  const found = lists[list]?.find?.((one) => one.id === id) as Record<string, unknown> | undefined;
  if (fact === 'rules.listen') file.production.rules = { ...file.production.rules, listen: file.production.rules?.listen === 0 ? 30 : 1 };
  else if (list === 'rules') file.production.rules = { ...file.production.rules, [id]: FREE[id as keyof typeof FREE] };
  else if (list === 'rooms' && field === 'open') found!.open = aroundTheClock(file);
  else if (field === 'count') found!.count = 1000;
  else if (field !== undefined) delete found![field];
  else lists[list] = lists[list]!.filter((one) => one.id !== id);
  if (list === 'passes' && field === undefined) for (const pass of file.passes!) forgetPass(pass, id);
  if (list === 'events') for (const pass of file.passes!) forgetEvent(pass, id);
  return file;
}

/** A window for each day, from midnight to midnight, from the day before the first that the file speaks of to the day after the last. */
function aroundTheClock(file: ProductionFile) {
  const dates = [...JSON.stringify(file).matchAll(/\d{4}-\d\d-\d\d/g)].map(([date]) => date).sort();
  const end = dayFrom(dates.at(-1)!, 2);
  const windows = [];
  for (let date = dayFrom(dates[0]!, -1); date < end; date = dayFrom(date, 1))
    windows.push({ from: `${date}T00:00`, to: `${dayFrom(date, 1)}T00:00` });
  return windows;
}

function dayFrom(date: string, days: number): string {
  return new Date(Date.parse(`${date}T00:00Z`) + days * 86_400_000).toISOString().slice(0, 10);
}

function forgetPass(pass: Pass, id: string): void {
  pass.after = pass.after?.filter((one) => !('pass' in one) || one.pass !== id);
  pass.before = pass.before?.filter((one) => !('pass' in one) || one.pass !== id);
  pass.together = pass.together?.filter((other) => other !== id);
  pass.apart = pass.apart?.filter((other) => other !== id);
}

function forgetEvent(pass: Pass, id: string): void {
  pass.after = pass.after?.filter((one) => !('event' in one) || one.event !== id);
  pass.before = pass.before?.filter((one) => !('event' in one) || one.event !== id);
}
