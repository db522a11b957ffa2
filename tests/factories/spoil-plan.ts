import type { MadePlan, PlanCall, PlanItem } from '../../shared/contracts/plan';
import type { Pass, ProductionFile } from '../../shared/contracts/resources';
import { twoRoomFile, twoRoomPlan } from './two-room-plan';

/** The plan worked out by hand with its file, and ways to spoil it. */
export interface Case {
  file: ProductionFile;
  plan: MadePlan;
}
export const fresh = (): Case => ({ file: twoRoomFile(), plan: twoRoomPlan() });

export function itemOf({ plan }: Case, kind: PlanItem['kind'], which: string): PlanItem {
  const found = plan.items.find((item) => item.kind === kind && (item.id === which || `${item.room} ${item.start}` === which));
  if (!found) throw new Error(`no ${kind} ${which} in the plan`);
  return found;
}
export function passOf({ file }: Case, id: string): Pass {
  return file.passes!.find((pass) => pass.id === id)!;
}
export function callOf({ plan }: Case, person: string, date: string): PlanCall {
  return plan.calls.find((call) => call.person === person && call.date === date)!;
}
export function move(item: PlanItem, from: string, to: string): void {
  item.start = `${item.start.slice(0, 11)}${from}`;
  item.end = `${item.end.slice(0, 11)}${to}`;
}
export function drop(the: Case, item: PlanItem): void {
  the.plan.items.splice(the.plan.items.indexOf(item), 1);
}
export const MONDAY = '2027-03-08';
export const TUESDAY = '2027-03-09';
export const open = (day: string, from: string, to: string) => ({ from: `${day}T${from}`, to: `${day}T${to}` });
