import type { Change } from '../contracts/changes';

/** A change before it has an id and a revision: what somebody wants done. */
export type Edit = Pick<Change, 'resource' | 'key' | 'op' | 'fields'>;

const create = (resource: Edit['resource'], key: string, fields: Edit['fields']): Edit => ({ resource, key, op: 'create', fields });
const update = (resource: Edit['resource'], key: string, fields: Edit['fields']): Edit => ({ resource, key, op: 'update', fields });
const remove = (resource: Edit['resource'], key: string): Edit => ({ resource, key, op: 'remove', fields: {} });

export const edit = { create, update, remove };
