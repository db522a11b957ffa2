import { rowSchemas } from '../../../shared/contracts/rows';
import type { ResourceName } from '../../../shared/contracts/resources';
import { idOfKey } from '../../../shared/domain/changes';
import type { Fault } from '../../../shared/contracts/api';
import { Refusal } from '../../http/errors';
import { faultsOf } from '../../http/validate';
import { extraFaults } from './extra';
import type { RowFields } from './mapping';

/** What the key of a row says about its fields. */
function identityOf(resource: ResourceName, key: string): RowFields {
  if (resource === 'production') return {};
  if (resource !== 'changeovers') return { id: idOfKey(resource, key) };
  const [from, to] = key.split('>');
  return { from, to };
}

const isObject = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null;

/** Fields that a schema left out because it does not know them. */
function unknownFields(sent: unknown, read: unknown, path: string): Fault[] {
  if (sent === read || !isObject(sent) || !isObject(read)) return [];
  return Object.entries(sent).flatMap(([name, value]): Fault[] => {
    if (value === undefined) return [];
    const at = `${path}.${name}`;
    return Object.hasOwn(read, name) ? unknownFields(value, read[name], at) : [{ path: at, expected: 'a field that is known here' }];
  });
}

const unknownNames = (resource: ResourceName, fields: RowFields, path: string): Fault[] =>
  Object.keys(fields)
    .filter((name) => !Object.hasOwn(rowSchemas[resource].shape, name))
    .map((name) => ({ path: `${path}.${name}`, expected: 'a field that is known here' }));

/**
 * The fields of a row, whole and checked by its schema; `null` clears a field, and the identity comes from the key. A Refusal names
 * every fault.
 */
export function checkedFields(resource: ResourceName, key: string, fields: RowFields): RowFields {
  const path = resource === 'production' ? 'production' : `${resource}.${key}`;
  const identity = identityOf(resource, key);
  const given = Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== null && value !== undefined));
  const strange = Object.entries(identity).filter(([name, value]) => name in given && given[name] !== value);
  const whole = { ...identity, ...given };
  const parsed = rowSchemas[resource].safeParse(whole);
  const faults: Fault[] = [
    ...strange.map(([name, value]) => ({ path: `${path}.${name}`, expected: `${String(value)}, as its key says; an id is not changed` })),
    ...(parsed.success ? unknownFields(whole, parsed.data, path) : faultsOf(parsed.error, path)),
    ...(parsed.success ? [] : unknownNames(resource, whole, path)),
    ...(parsed.success && parsed.data.extra ? extraFaults(resource, parsed.data.extra, `${path}.extra`) : []),
  ];
  if (faults.length > 0 || !parsed.success) throw wrongFields(faults);
  return parsed.data;
}

/** A refusal that says the first fault in words and carries all of them. */
export function wrongFields(faults: Fault[]): Refusal {
  const [first] = faults;
  const more = faults.length > 1 ? ` There are ${faults.length - 1} more.` : '';
  return new Refusal(
    'wrong-fields',
    first ? `${first.path} should be ${first.expected}.${more} Nothing was changed: correct it and send it again.` : 'Nothing was changed.',
    faults,
  );
}
