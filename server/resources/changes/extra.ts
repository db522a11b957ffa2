import { z } from 'zod';
import type { Fault } from '../../../shared/contracts/api';
import { production, rules, weights } from '../../../shared/contracts/head';
import { type ResourceName } from '../../../shared/contracts/resources';
import { type ExtraField } from '../../../shared/contracts/values';
import { rowSchemas } from '../../../shared/contracts/rows';
import { unprintableAt } from '../../../shared/contracts/values';
import { setOwn } from '../../../shared/file/paths';
import { LISTS } from '../../../shared/file/references';
import { separate } from '../../../shared/file/unknown';

/**
 * Unknown fields are kept for the export. What comes in beside the file's reader is held to the same: a place that no known field
 * has, and a value that can be written and read again.
 */
const MOST = 1000;
const DEEPEST = 40;
const LARGEST_POSITION = 5000;

const anything = z.unknown();
/** Unknown fields of the head stand anywhere in the file outside its lists. */
const wholeFile = z.object({
  redpoll: anything,
  production: production.omit({ rules: true, weights: true }),
  rules,
  weights,
  ...Object.fromEntries(LISTS.map((name) => [name, anything])),
});

/** A value with nothing around it but the way to it. */
function atPath(path: ExtraField['path'], value: unknown): unknown {
  return path.reduceRight<unknown>((inner, step) => {
    const owner: object = typeof step === 'number' ? [] : {};
    setOwn(owner, step, inner);
    return owner;
  }, value);
}

function isUnknown(resource: ResourceName, { path, value }: ExtraField): boolean {
  const isPlace = path.every((step) => typeof step === 'string' || (Number.isInteger(step) && step >= 0 && step < LARGEST_POSITION));
  if (!isPlace || path.length === 0 || path.length > DEEPEST) return false;
  const { unknown } = separate(resource === 'production' ? wholeFile : rowSchemas[resource], atPath(path, value));
  return unknown.length === 1 && unknown[0]?.path.length === path.length;
}

/** Whether a value can be written to a file: not too deep, and without signs that YAML does not print. */
function isWritable(value: unknown, depth = 0): boolean {
  if (typeof value === 'string') return unprintableAt(value) < 0;
  if (typeof value !== 'object' || value === null) return true;
  if (depth >= DEEPEST) return false;
  return Object.entries(value).every(([key, inner]) => unprintableAt(key) < 0 && isWritable(inner, depth + 1));
}

export function extraFaults(resource: ResourceName, extra: readonly ExtraField[], path: string): Fault[] {
  if (extra.length > MOST) return [{ path, expected: `at most ${MOST} unknown fields` }];
  return extra.flatMap((field, at): Fault[] => {
    if (!field.path.every((step) => isWritable(step)) || !isWritable(field.value))
      return [{ path: `${path}.${at}.value`, expected: 'a value that a file can hold' }];
    return isUnknown(resource, field) ? [] : [{ path: `${path}.${at}.path`, expected: 'the place of a field that is not known otherwise' }];
  });
}
