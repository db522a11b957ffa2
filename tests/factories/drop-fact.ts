import type { Pass, ProductionFile, Rules } from '../../shared/contracts/resources';

/** A rule that asks for nothing. */
const FREE: Required<Rules> = {
  step: 1,
  mealAfter: 1_000_000,
  meal: 0,
  breakAfter: 0,
  break: 0,
  wrap: 0,
  listen: 30,
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
  if (list === 'rules') file.production.rules = { ...file.production.rules, [id]: FREE[id as keyof Rules] };
  else if (list === 'rooms' && field === 'open') found!.open = aroundTheClock();
  else if (field === 'count') found!.count = 1000;
  else if (field !== undefined) delete found![field];
  else lists[list] = lists[list]!.filter((one) => one.id !== id);
  if (list === 'passes' && field === undefined) for (const pass of file.passes!) forgetPass(pass, id);
  if (list === 'events') for (const pass of file.passes!) forgetEvent(pass, id);
  return file;
}

function aroundTheClock() {
  return [
    { from: '2027-03-01T00:00', to: '2027-03-08T00:00' },
    ...['08', '09', '10', '11', '12'].map((day) => ({
      from: `2027-03-${day}T00:00`,
      to: `2027-03-${String(Number(day) + 1).padStart(2, '0')}T00:00`,
    })),
  ];
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
