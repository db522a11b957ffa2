import type { Hours, Presence, ThreePoint } from '../contracts/values';
import { readWindows, type WindowFault } from '../time/windows';
import type { WallDate } from './flavours';

/** What people type into a form, and how it is written back. A text that is not understood is told apart by what was expected. */
export type Entry<Value> = { value: Value | null } | { expected: string };
type Read<Value> = { value: Value | null };

const isWhole = (text: string): boolean => /^\d{1,6}$/.test(text);

/** `45`, `30 45 70`, `30 · 45 · 70`, `30–45–70`; nothing clears it. */
export function readMinutes(text: string): Entry<ThreePoint> {
  const expected = 'minutes such as 45, or low, likely and high such as 30 45 70';
  const parts = text.split(/[\s·,/–—-]+/).filter((part) => part !== '' && part !== 'min');
  if (parts.length === 0) return { value: null };
  if (!parts.every(isWhole)) return { expected };
  const numbers = parts.map(Number);
  const [low = 0, likely = 0, high = 0] = numbers;
  if (numbers.length === 1) return low >= 1 ? { value: low } : { expected };
  return numbers.length === 3 && low >= 1 && low <= likely && likely <= high ? { value: [low, likely, high] } : { expected };
}

export function writeMinutes(minutes: ThreePoint | undefined): string {
  if (minutes === undefined) return '';
  return typeof minutes === 'number' ? String(minutes) : minutes.join(' · ');
}

/** A whole number of at least `least` and at most `most`; nothing clears it. */
export function readWhole(text: string, least = 0, most = 1_000_000_000): Entry<number> {
  const plain = text.trim();
  if (plain === '') return { value: null };
  const expected = most === 1_000_000_000 ? `a whole number of at least ${least}` : `a whole number from ${least} to ${most}`;
  if (!/^\d{1,10}$/.test(plain)) return { expected };
  const value = Number(plain);
  return value >= least && value <= most ? { value } : { expected };
}

/** A number, with a point or a comma; nothing clears it. */
export function readNumber(text: string, least: number, most = 1_000_000_000): Entry<number> {
  const plain = text.trim().replace('−', '-').replace(',', '.');
  if (plain === '') return { value: null };
  const expected = most === 1_000_000_000 ? `a number of at least ${least}` : `a number from ${least} to ${most}`;
  if (!/^-?\d+(\.\d+)?$/.test(plain)) return { expected };
  const value = Number(plain);
  return value >= least && value <= most ? { value } : { expected };
}

export const writeNumber = (value: number | undefined): string => (value === undefined ? '' : String(value));

/** Things separated by commas, semicolons or lines; nothing clears it. */
export function readList(text: string): Read<string[]> {
  const items = text
    .split(/[,;\n]/)
    .map((item) => item.trim())
    .filter((item) => item !== '');
  return { value: items.length > 0 ? items : null };
}

export const writeList = (items: readonly string[] | undefined): string => (items ?? []).join(', ');

export const readText = (text: string): Read<string> => ({ value: text.trim() === '' ? null : text.trim() });

/** Length, width and height in metres: `9 × 7 × 3.2`; nothing clears it. */
export function readSize(text: string): Entry<[number, number, number]> {
  const parts = text
    .replaceAll(',', '.')
    .split(/\s*(?:×|x|\*|\s)\s*/i)
    .filter((part) => part !== '' && part !== 'm');
  if (parts.length === 0) return { value: null };
  const [length = NaN, width = NaN, height = NaN] = parts.map(Number);
  const good = parts.length === 3 && [length, width, height].every((metres) => metres > 0 && metres < 1000);
  return good ? { value: [length, width, height] } : { expected: 'length × width × height in metres, such as 9 × 7 × 3.2' };
}

export const writeSize = (size: readonly number[] | undefined): string => (size ?? []).join(' × ');

const faultWords = (faults: readonly WindowFault[]): string => faults.map(({ text, expected }) => `${expected} (not “${text}”)`).join('; ');

/** When somebody can be there, one window to a line; `always` clears it. `around` is a day of the production. */
export function readPresence(text: string, around: WallDate): Entry<Presence[]> {
  const { windows, faults } = readWindows(text, around);
  return faults.length > 0 ? { expected: faultWords(faults) } : { value: windows ?? null };
}

/** Hours that are open, loud or hired, one stretch to a line; there is no maybe here. */
export function readHours(text: string, around: WallDate): Entry<Hours[]> {
  const { windows, faults } = readWindows(text, around);
  if (faults.length > 0) return { expected: faultWords(faults) };
  if (windows?.some((window) => window.sure === false)) return { expected: 'hours that are sure; a maybe is for people' };
  return { value: windows ?? null };
}

/** One stretch of time. */
export function readSpan(text: string, around: WallDate): Entry<Hours> {
  const entry = readHours(text, around);
  if ('expected' in entry) return entry;
  const [span, ...others] = entry.value ?? [];
  return span && others.length === 0 ? { value: span } : { expected: 'one stretch of time, such as 10 Mar 18–18:15' };
}

interface Named {
  id: string;
  name?: string;
  short?: string;
}

/** Minutes by person: `Tobin 75, Dov 30`. */
export function readMinutesByPerson(text: string, people: readonly Named[]): Entry<Record<string, number>> {
  const entries: [string, number][] = [];
  for (const item of readList(text).value ?? []) {
    const match = /^(.+?)[\s:]+(\d{1,4})(?:\s*min)?$/.exec(item);
    const wanted = match?.[1]?.trim().toLowerCase();
    const person = people.find(({ id, name, short }) => [id, name, short].some((known) => known?.toLowerCase() === wanted));
    if (!match || !person)
      return { expected: `a short name and minutes, such as ${people[0]?.short ?? people[0]?.name ?? 'Mara'} 30 (not “${item}”)` };
    entries.push([person.id, Number(match[2])]);
  }
  return { value: entries.length > 0 ? Object.fromEntries(entries) : null };
}

export function writeMinutesByPerson(minutes: Readonly<Record<string, number>> | undefined, people: readonly Named[]): string {
  return Object.entries(minutes ?? {})
    .map(([id, value]) => {
      const person = people.find((one) => one.id === id);
      return `${person?.short ?? person?.name ?? id} ${value}`;
    })
    .join(', ');
}
