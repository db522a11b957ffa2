import type { Fault } from '../../shared/contracts/api';
import type { Change, Row } from '../../shared/contracts/changes';
import { rowSchemas } from '../../shared/contracts/rows';
import { idOfKey } from '../../shared/domain/changes';
import type { Edit } from '../../shared/domain/edits';

/** The client's own idea of what a change does, until the server's answer takes its place. */

export const rowKey = (resource: string, key: string): string => `${resource} ${key}`;
export type Rows = ReadonlyMap<string, Row>;

/** What a row's key says about its fields; edits need not say it again. */
function identityOf({ resource, key }: Pick<Edit, 'resource' | 'key'>): Record<string, string> {
  if (resource === 'production') return {};
  if (resource !== 'changeovers') return { id: idOfKey(resource, key) };
  const [from = '', to = ''] = key.split('>');
  return { from, to };
}

const withFields = (before: Record<string, unknown>, fields: Record<string, unknown>): Record<string, unknown> =>
  Object.fromEntries(Object.entries({ ...before, ...fields }).filter(([, value]) => value !== null && value !== undefined));

/** The row after one change; absent where there is nothing to change. */
function rowAfter(rows: Rows, edit: Edit, revision: number): Row | undefined {
  const before = rows.get(rowKey(edit.resource, edit.key));
  if (edit.op === 'create') {
    const position = before?.position ?? lastPosition(rows, edit) + 1;
    return {
      resource: edit.resource,
      key: edit.key,
      revision,
      position,
      removed: false,
      fields: withFields(identityOf(edit), edit.fields),
    };
  }
  if (!before) return undefined;
  if (edit.op === 'update') return { ...before, revision, fields: withFields(before.fields, edit.fields) };
  return { ...before, revision, removed: edit.op === 'remove' };
}

function lastPosition(rows: Rows, edit: Edit): number {
  let last = -1;
  for (const row of rows.values()) if (row.resource === edit.resource && row.position > last) last = row.position;
  return last;
}

/** The rows as they would stand after the edits. */
export function rowsAfter(rows: Rows, edits: Edit[], revision: number): Rows {
  const next = new Map(rows);
  for (const edit of edits) {
    const row = rowAfter(next, edit, revision);
    if (row) next.set(rowKey(edit.resource, edit.key), row);
  }
  return next;
}

/** A row that was removed is brought back and then set, so that its history goes on; everything else passes as it is. */
export function revived(rows: Rows, edits: Edit[]): Edit[] {
  return edits.flatMap((edit): Edit[] => {
    const before = rows.get(rowKey(edit.resource, edit.key));
    if (edit.op !== 'create' || !before?.removed) return [edit];
    const cleared = Object.fromEntries(Object.keys(before.fields).map((field) => [field, null]));
    const identity = identityOf(edit);
    const fields = Object.fromEntries(Object.entries({ ...cleared, ...edit.fields }).filter(([field]) => !(field in identity)));
    return [
      { ...edit, op: 'restore', fields: {} },
      { ...edit, op: 'update', fields },
    ];
  });
}

/** What is wrong with the rows that the edits touch, by the contract; nothing when all is well. */
export function faultsAfter(rows: Rows, edits: Edit[]): Fault[] {
  const after = rowsAfter(rows, edits, 0);
  return edits.flatMap((edit): Fault[] => {
    const row = after.get(rowKey(edit.resource, edit.key));
    if (!row || row.removed) return [];
    const parsed = rowSchemas[edit.resource].safeParse(row.fields);
    if (parsed.success) return [];
    return parsed.error.issues.map((issue) => ({ path: [edit.resource, edit.key, ...issue.path].join('.'), expected: issue.message }));
  });
}

export function toChanges(edits: Edit[], newId: () => string): Change[] {
  return edits.map((edit) => {
    const { resource, key, op } = edit;
    return { id: newId(), resource, key, op, fields: op === 'create' ? { ...identityOf(edit), ...edit.fields } : edit.fields };
  });
}
