import { z } from 'zod';
import { resourceNames } from './resources';

/**
 * The one write path. A change names a resource and a key within the production (`shared/contracts/resources.ts`).
 * `create` carries all fields in the form of the file, `update` only those that change (`null` clears one), `remove` and `restore` none.
 */
export const change = z.object({
  id: z.uuid(),
  resource: z.enum(resourceNames),
  key: z.string().min(1).max(130),
  op: z.enum(['create', 'update', 'remove', 'restore']),
  fields: z.record(z.string(), z.unknown()).default({}),
  /** Revision of the production on which this change was made; absent for a fresh row. */
  base: z.int().min(0).optional(),
});
export type Change = z.infer<typeof change>;

export const changesRequest = z.object({ changes: z.array(change).min(1).max(5000) });

export const row = z.object({
  resource: z.enum(resourceNames),
  key: z.string(),
  /** Revision of the production at which this row was last written. */
  revision: z.int(),
  /** Order within its list. */
  position: z.int(),
  removed: z.boolean(),
  /** The resource in the form of the file, as this reader may see it (`position`, `removed` not included). A part carries its song's id as the first half of its key. */
  fields: z.record(z.string(), z.unknown()),
});
export type Row = z.infer<typeof row>;

/** A field that somebody else changed since `base`; the later value won, the other stays in the history. */
export const overwritten = z.object({
  change: z.uuid(),
  resource: z.enum(resourceNames),
  key: z.string(),
  field: z.string(),
  was: z.unknown(),
});

export const changesResponse = z.object({ revision: z.int(), rows: z.array(row), overwritten: z.array(overwritten) });
export type ChangesResponse = z.infer<typeof changesResponse>;
