import { randomUUID } from 'node:crypto';
import type { InferCreationAttributes } from 'sequelize';
import type { PlanCall } from '../../../shared/contracts/plan';
import type { CallModel } from '../../models/plans';

type NewCall = Omit<InferCreationAttributes<CallModel>, 'id' | 'productionId' | 'versionId'>;

const keyOf = (personId: string, date: string) => `${personId} ${date}`;

/**
 * The calls of a new version. A call keeps its uid from version to version; its sequence grows when its times or its status change.
 * A call that is gone stays as a cancelled one, so that calendars take it out.
 */
export function nextCalls(
  before: readonly CallModel[],
  planned: readonly { call: PlanCall; personId: string; worded: boolean }[],
  now: Date,
): NewCall[] {
  const known = new Map(before.map((call) => [keyOf(call.personId, call.date), call]));
  const called = planned.map(({ call, personId, worded }): NewCall => {
    const { date, arrive, ready, release, working, waiting } = call;
    const was = known.get(keyOf(personId, date));
    known.delete(keyOf(personId, date));
    const moved =
      was !== undefined && (was.status === 'cancelled' || was.arrive !== arrive || was.ready !== ready || was.release !== release);
    return {
      personId,
      date,
      arrive,
      ready,
      release,
      working,
      waiting,
      uid: was?.uid ?? randomUUID(),
      sequence: was ? was.sequence + (moved ? 1 : 0) : 0,
      status: 'called',
      changedAt: was && !moved && !worded ? was.changedAt : now,
    };
  });
  const gone = [...known.values()].map(
    ({ personId, date, arrive, ready, release, working, waiting, uid, sequence, status, changedAt }): NewCall => {
      const kept = { personId, date, arrive, ready, release, working, waiting, uid, status: 'cancelled' as const };
      return status === 'cancelled' ? { ...kept, sequence, changedAt } : { ...kept, sequence: sequence + 1, changedAt: now };
    },
  );
  return [...called, ...gone];
}
