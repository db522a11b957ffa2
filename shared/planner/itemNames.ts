import type { PlanItem } from '../contracts/plan';
import type { ProductionFile } from '../contracts/resources';
import { eventName, passInWords } from '../domain/passes';
import { effectivePasses } from './derive';

export type ItemNamer = (item: PlanItem) => string;

/** How the items of a plan are called in a sentence: `S03 Half a Ferry`, `the changeover to Brushes`, `the wrap`. */
export function itemNamer(file: ProductionFile): ItemNamer {
  const passes = new Map(effectivePasses(file).map((pass) => [pass.id, pass]));
  const events = new Map(file.events.map((event) => [event.id, event]));
  const setups = new Map(file.setups.map((setup) => [setup.id, setup.name ?? setup.id]));
  return (item) => {
    const pass = item.kind === 'pass' ? passes.get(item.id ?? '') : undefined;
    if (pass) return passInWords(file, pass);
    const event = item.kind === 'event' ? events.get(item.id ?? '') : undefined;
    if (event) return eventName(event);
    const setup = item.setup === undefined ? undefined : setups.get(item.setup);
    if (item.kind === 'rig') return setup === undefined ? 'the rig' : `the rig of ${setup}`;
    if (item.kind === 'changeover') return setup === undefined ? 'the changeover' : `the changeover to ${setup}`;
    return `the ${item.kind}`;
  };
}
