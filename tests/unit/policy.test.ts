import { describe, expect, it } from 'vitest';
import { resourceNames } from '../../shared/contracts/resources';
import { roles, type Role } from '../../shared/contracts/roles';
import { rowSchemas } from '../../shared/contracts/rows';
import { actions, hiddenPaths, keepHidden, may, readableFields, refusalOf, type Action, type Reader } from '../../shared/domain/policy';

const as = (role: Role, person: string | null = null): Reader => ({ role, person });

describe('what a role may', () => {
  it.each<[Action, Role[]]>([
    ['read', ['producer', 'engineer', 'assistant', 'musician', 'guest']],
    ['readVersions', ['producer', 'engineer', 'assistant', 'musician', 'guest']],
    ['readDrafts', ['producer', 'engineer', 'assistant']],
    ['readHistory', ['producer', 'engineer', 'assistant']],
    ['export', ['producer', 'engineer', 'assistant']],
    ['print', ['producer', 'engineer', 'assistant']],
    ['plan', ['producer', 'engineer']],
    ['publish', ['producer', 'engineer']],
    ['manageMembers', ['producer']],
    ['remove', ['producer']],
  ])('%s: %j', (action, allowed) => {
    expect(roles.filter((role) => may(role, action))).toEqual(allowed);
  });

  it('only narrows from producer to engineer to assistant', () => {
    for (const action of actions) {
      if (may('assistant', action)) expect(may('engineer', action)).toBe(true);
      if (may('engineer', action)) expect(may('producer', action)).toBe(true);
    }
  });
});

describe('what a role sees', () => {
  it('names only fields that there are', () => {
    for (const resource of resourceNames)
      for (const path of hiddenPaths(as('guest'), resource, 'x') ?? [])
        expect([resource, path.split('.')[0]]).toEqual([resource, expect.toSatisfy((name: string) => name in rowSchemas[resource].shape)]);
  });

  it('is everything for the producer', () => {
    for (const resource of resourceNames) expect(hiddenPaths(as('producer'), resource, 'x')).toEqual([]);
  });

  it('leaves the given fields as they are', () => {
    const fields = { id: 'una', fee: { call: 1, waiting: 2 }, phone: '1' };
    const before = structuredClone(fields);
    expect(readableFields(as('engineer'), 'people', 'una', fields)).toEqual({ id: 'una', fee: { waiting: 2 }, phone: '1' });
    expect(readableFields(as('guest'), 'people', 'una', fields)).toEqual({ id: 'una' });
    expect(readableFields(as('guest'), 'gear', 'organ', { id: 'organ' })).toBeNull();
    expect(fields).toEqual(before);
  });
});

describe('what a role writes', () => {
  it('keeps the hidden half of a group, also when the seen half is cleared', () => {
    const stored = { fee: { call: 90, waiting: 1 } };
    expect(keepHidden(as('engineer'), 'people', 'una', stored, { fee: { waiting: 5 } })).toEqual({ fee: { waiting: 5, call: 90 } });
    expect(keepHidden(as('engineer'), 'people', 'una', stored, { fee: null })).toEqual({ fee: { call: 90 } });
    expect(keepHidden(as('engineer'), 'people', 'una', stored, { name: 'Una' })).toEqual({ name: 'Una' });
    expect(keepHidden(as('producer'), 'people', 'una', stored, { fee: null })).toEqual({ fee: null });
  });

  it('says why not, as a sentence', () => {
    const attempt = { resource: 'people', key: 'una', op: 'update', fields: { fee: { call: 1 } } } as const;
    expect(refusalOf(as('producer'), attempt)).toBeNull();
    for (const role of roles) if (role !== 'producer') expect(refusalOf(as(role, 'una'), attempt)).toMatch(/\.$/);
    expect(refusalOf(as('musician', 'una'), { ...attempt, fields: { windows: [] } })).toBeNull();
    expect(refusalOf(as('musician', 'teo'), { ...attempt, fields: { windows: [] } })).toContain('producer');
  });
});
