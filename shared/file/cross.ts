import { production } from '../contracts/head';
import { changeoverFaults, emptyPins, overlappingHours, passesWithoutRoom, skippedTimes } from './checks';
import { fieldOf, type Fields } from './paths';
import { derivedIdFaults, repeatedIds, selfReferences, strangeParts, unknownReferences } from './references';
import type { PathFault } from './yaml';

/**
 * The faults of a production that no single resource shows: ids given twice or naming nothing, hours that overlap, times that the
 * clock of its zone skips. Paths have list positions. Asked of a file as it was read, and of the rows after an edit.
 */
export function crossFaults(root: Fields): PathFault[] {
  const zone = production.shape.timezone.safeParse(fieldOf(root.production, 'timezone'));
  return [
    ...repeatedIds(root),
    ...unknownReferences(root),
    ...selfReferences(root),
    ...strangeParts(root),
    ...derivedIdFaults(root),
    ...overlappingHours(root),
    ...passesWithoutRoom(root),
    ...changeoverFaults(root),
    ...emptyPins(root),
    ...(zone.success ? skippedTimes(root, zone.data) : []),
  ];
}
