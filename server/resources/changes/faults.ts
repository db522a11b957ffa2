import type { Fault } from '../../../shared/contracts/api';
import type { ProductionFile, ResourceName } from '../../../shared/contracts/resources';
import { rowWords } from '../../../shared/contracts/rows';
import { fileOf, idOfKey } from '../../../shared/domain/changes';
import { crossFaults } from '../../../shared/file/cross';
import { wrongFields } from './fields';
import { namedBy } from './mapping';
import type { KnownRow, Rows } from './rows';

/** References of the touched rows that name nothing; what stands may not name what was removed either. */
function danglingReferences(rows: Rows, touched: Iterable<KnownRow>): Fault[] {
  return [...touched].flatMap((row) =>
    namedBy(row.resource, row.key, row.fields)
      .filter(({ to, key }) => {
        const named = rows.get(to, key);
        return !named || (named.removed && !row.removed);
      })
      .map(({ to, key, path }) => ({
        path: [row.resource, row.key, ...path].join('.'),
        expected: `the id of a ${rowWords[to]} that is there; "${idOfKey(to, key)}" is none`,
      })),
  );
}

const isIndexed = (value: unknown): value is { id?: string }[] => Array.isArray(value);

/** The path of a fault of the whole file with ids in place of list positions: `passes.s1-basics.people.0`. */
function pathById(file: ProductionFile, path: readonly (string | number)[]): string {
  const [list, at, ...rest] = path;
  const items: unknown = list === undefined ? undefined : file[list as keyof ProductionFile];
  const item = isIndexed(items) && typeof at === 'number' ? items[at] : undefined;
  const named = item?.id ?? at;
  return [list, named, ...rest].filter((step) => step !== undefined).join('.');
}

const faultsOfFile = (rows: Rows): Fault[] => {
  const file = fileOf(rows.all());
  return crossFaults({ ...file }).map(({ path, expected }) => ({ path: pathById(file, path), expected }));
};

/** Refuses a batch after which the production has a fault that it did not have before. */
export function demandNoNewFault(before: Rows, after: Rows, touched: Iterable<KnownRow>): void {
  const dangling = danglingReferences(after, touched);
  if (dangling.length > 0) throw wrongFields(dangling);
  const faults = faultsOfFile(after);
  if (faults.length === 0) return;
  const old = new Set(faultsOfFile(before).map((fault) => JSON.stringify(fault)));
  const fresh = faults.filter((fault) => !old.has(JSON.stringify(fault)));
  if (fresh.length > 0) throw wrongFields(fresh);
}

/** Which rows a batch names, for an answer to a batch that was applied before. */
export const rowsNamed = (rows: Rows, named: readonly { resource: ResourceName; key: string }[]): KnownRow[] => [
  ...new Set(named.flatMap(({ resource, key }) => rows.get(resource, key) ?? [])),
];
