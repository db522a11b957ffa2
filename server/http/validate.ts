import { z } from 'zod';
import type { Fault } from '../../shared/contracts/api';
import { Refusal } from './errors';

/** The faults of a schema as the page shows them: path with dots, and what was expected there. */
export function faultsOf(error: z.ZodError, prefix = ''): Fault[] {
  return error.issues.map((issue) => ({
    path: [prefix, ...issue.path.map(String)].filter((part) => part !== '').join('.'),
    expected: issue.message,
  }));
}

/** Reads a request's part by its schema; a wrong one is refused with every fault. */
export function validate<Output>(schema: z.ZodType<Output>, value: unknown, what: string): Output {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const faults = faultsOf(parsed.error);
  const first = faults[0];
  const detail = first?.path
    ? `${what}: ${first.path} should be ${first.expected}.`
    : `${what}: expected ${first?.expected ?? 'something else'}.`;
  throw new Refusal('wrong-fields', `${detail} Correct it and send it again.`, faults);
}

const uuid = z.uuid();

/** An id in an address; what is no id cannot be there. */
export function validId(value: unknown): string {
  const parsed = uuid.safeParse(value);
  if (!parsed.success) throw new Refusal('not-found', 'There is nothing at this address. Go back to the start page.');
  return parsed.data;
}
