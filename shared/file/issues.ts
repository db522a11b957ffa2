import type { z } from 'zod';
import type { PathFault } from './yaml';
import type { Path } from './paths';

type Issue = z.core.$ZodIssue;
type RawIssue = z.core.$ZodRawIssue;

/** What was expected where the schema itself has no words for it. */
export function expectedBy(issue: RawIssue): string {
  if (issue.code === 'invalid_type') {
    if (issue.expected === 'object') return 'a mapping of fields, such as { id: a }';
    if (issue.expected === 'record') return 'a mapping of ids to minutes, such as { mara: 20 }';
    if (issue.expected === 'array' || issue.expected === 'tuple') return 'a list';
    return `a ${issue.expected}`;
  }
  if (issue.code === 'invalid_key') return 'an id of small letters, digits and hyphens before the colon';
  if (issue.code === 'too_small') return `at least ${String(issue.minimum)}`;
  if (issue.code === 'too_big') return `at most ${String(issue.maximum)}`;
  return 'another value';
}

const isSpecific = (issue: Issue) => issue.path.length > 0 && issue.code !== 'unrecognized_keys';

/**
 * Where one of several forms was wanted: the faults inside the one form that the value plainly is, when there is just one whose
 * trouble lies deeper than in the names of its fields.
 */
function insideOfUnion(issue: Issue): Issue[] | undefined {
  if (issue.code !== 'invalid_union' || issue.errors.length === 0) return undefined;
  const deeper = issue.errors.filter((branch) => branch.every(isSpecific));
  const only = deeper.length === 1 ? deeper[0] : undefined;
  return only?.some((inner) => typeof inner.path[0] === 'number') ? undefined : only;
}

/** The issues of a schema as faults of the file, below the path at which its value stands. */
export function faultsOf(error: z.ZodError, base: Path): PathFault[] {
  return error.issues.flatMap((issue) => faultsOfIssue(issue, base));
}

function faultsOfIssue(issue: Issue, base: Path): PathFault[] {
  const path = [...base, ...issue.path.map((step) => (typeof step === 'number' ? step : String(step)))];
  const inner = insideOfUnion(issue);
  if (inner) return inner.flatMap((one) => faultsOfIssue(one, path));
  return [{ path, expected: issue.message, key: issue.code === 'invalid_key' }];
}
