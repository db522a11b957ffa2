import type { ThreePoint } from '../contracts/values';

/** What people type into a form, and how it is written back. A text that is not understood is told apart by what was expected. */
export type Entry<Value> = { value: Value | null } | { expected: string };

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
export function readList(text: string): Entry<string[]> {
  const items = text
    .split(/[,;\n]/)
    .map((item) => item.trim())
    .filter((item) => item !== '');
  return { value: items.length > 0 ? items : null };
}

export const writeList = (items: readonly string[] | undefined): string => (items ?? []).join(', ');

export const readText = (text: string): Entry<string> => ({ value: text.trim() === '' ? null : text.trim() });

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
