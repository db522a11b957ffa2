import { callTexts, summaryOf } from '../../shared/domain/calendar/call-text';
import type { MadePlan } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import type { CallModel } from '../models/plans';
import type { CalendarEvent } from './write';

type Kept = Pick<CallModel, 'date' | 'arrive' | 'release' | 'uid' | 'sequence' | 'status' | 'changedAt'>;

/**
 * The events of a person's calendar: the calls of the newest version in its words, and those that were cancelled since an earlier one,
 * which stay so that every calendar takes them out.
 */
export function eventsOf(file: ProductionFile, plan: MadePlan, person: string, calls: readonly Kept[]): CalendarEvent[] {
  const texts = new Map(callTexts(file, plan, person).map(({ call, text }) => [call.date, text]));
  return calls.map((call): CalendarEvent => {
    const kept = { uid: call.uid, sequence: call.sequence, changedAt: call.changedAt, from: call.arrive, to: call.release };
    const text = call.status === 'called' ? texts.get(call.date) : undefined;
    return text
      ? { ...kept, ...text, status: 'confirmed' }
      : { ...kept, status: 'cancelled', summary: `Cancelled: ${summaryOf(file)}`, location: '', description: 'You are not needed then.' };
  });
}
