import type { Rules } from '../../shared/contracts/head';
import type { ProductionFile } from '../../shared/contracts/resources';
import { hours } from './bare-production';

/** An impossible production, the facts that clash in it, and what the sentence must say. */
export type Impossible = [name: string, make: () => ProductionFile, facts: string[], says: RegExp];

export function withRules(file: ProductionFile, rules: Rules): ProductionFile {
  file.production.rules = { ...file.production.rules, ...rules };
  return file;
}
export function edited(file: ProductionFile, edit: (file: ProductionFile) => void): ProductionFile {
  edit(file);
  return file;
}
/** Lys with windows of her own. */
export const lysFree = (file: ProductionFile, ...windows: ReturnType<typeof hours>[]) =>
  edited(file, () => (file.people[2]!.windows = windows));
/** Both rooms with one open window on the first day. */
export const shifts = (from: string, to: string) => (file: ProductionFile) => {
  for (const room of file.rooms) room.open = [hours('08', from, to)];
};
