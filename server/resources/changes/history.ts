import type { HistoryEntry } from '../../../shared/contracts/api';
import type { ResourceName } from '../../../shared/contracts/resources';
import { readableFields, type Reader } from '../../../shared/domain/policy';
import type { Context } from '../../context';

const MOST = 500;

/** What happened to one row, one kind of rows or the whole production, the latest first, as this reader may see it. */
export async function readHistory(
  { db }: Context,
  reader: Reader & { productionId: string },
  of: { resource?: ResourceName; key?: string },
): Promise<HistoryEntry[]> {
  const entries = await db.history.findAll({
    where: {
      productionId: reader.productionId,
      ...(of.resource ? { resource: of.resource } : {}),
      ...(of.key === undefined ? {} : { key: of.key }),
    },
    order: [
      ['revision', 'DESC'],
      ['ordinal', 'DESC'],
    ],
    limit: MOST,
  });
  return entries.flatMap((entry) => {
    const resource = entry.resource as ResourceName;
    const seen = (fields: Record<string, unknown> | null) => fields && readableFields(reader, resource, entry.key, fields);
    if (readableFields(reader, resource, entry.key, {}) === null) return [];
    return [
      {
        revision: entry.revision,
        at: entry.at.toISOString(),
        by: entry.byName,
        resource,
        key: entry.key,
        op: entry.op,
        before: seen(entry.before),
        after: seen(entry.after),
      },
    ];
  });
}
