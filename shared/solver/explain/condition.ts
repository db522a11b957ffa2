import type { View } from './view';

/**
 * Something that every valid plan needs. Where it fails, no valid plan exists; where it does not, nothing is known. Dropping a fact never
 * makes one fail that did not fail before.
 */
export interface NecessaryCondition {
  name: string;
  /** Whether how long a pass takes, where and with whom plays no part in the reasons. */
  bare?: boolean;
  /** What it is asked of: passes, people, rooms … each on its own. */
  subjects(view: View): string[];
  /** What cannot be, in words and without its reasons; null where nothing is proven. */
  fails(view: View, subject: string): string | null;
}
