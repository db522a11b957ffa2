import { randomUUID } from 'node:crypto';
import type { Change } from '../../../shared/contracts/changes';
import type { ResourceName } from '../../../shared/contracts/resources';
import { rowWords } from '../../../shared/contracts/rows';
import { HEAD, idOfKey, songOfKey } from '../../../shared/domain/changes';
import { keepHidden, refusalOf, type Reader } from '../../../shared/domain/policy';
import { Refusal } from '../../http/errors';
import { checkedFields } from './fields';
import type { RowFields } from './mapping';
import type { KnownRow, Rows } from './rows';

/** What one change did to its row: the fields before and after, as the history keeps them. */
export interface Effect {
  change: Change;
  before: RowFields | null;
  after: RowFields | null;
}

const wordsFor = (resource: ResourceName, key: string) =>
  resource === 'production' ? 'the production' : `the ${rowWords[resource]} ${idOfKey(resource, key)}`;

/** Applies a batch to the rows of a production in memory; throws a Refusal at the first change that cannot be. */
export class Batch {
  readonly touched = new Set<KnownRow>();
  readonly effects: Effect[] = [];

  constructor(
    readonly rows: Rows,
    private readonly writer: Reader,
    private readonly isBlank: boolean,
  ) {}

  apply(change: Change): void {
    const refusal = refusalOf(this.writer, change);
    if (refusal !== null) throw new Refusal('not-allowed', refusal);
    this.effects.push({ change, ...this[change.op](change) });
  }

  private create(change: Change): Omit<Effect, 'change'> {
    const { resource, key } = change;
    const known = this.rows.get(resource, key);
    if (known && !known.removed && !(resource === 'production' && this.isBlank))
      throw new Refusal('conflict', `There is already ${wordsFor(resource, key)}. Choose another id, or change the one that is there.`);
    if (!known && resource === 'production') throw new Refusal('wrong-fields', `The key of the production is "${HEAD}".`);
    const fields = checkedFields(resource, key, { ...change.fields, position: null });
    const before = known && resource !== 'production' ? known.fields : null;
    const row: KnownRow = known ?? { id: randomUUID(), resource, key, revision: 0, position: 0, removed: false, fields };
    row.fields = fields;
    row.removed = false;
    if (resource !== 'production') row.position = this.nextPosition(row);
    this.rows.add(row);
    this.touched.add(row);
    return { before, after: fields };
  }

  private update(change: Change): Omit<Effect, 'change'> {
    const row = this.standing(change);
    const { position, ...sent } = change.fields;
    const before: RowFields = {};
    const after: RowFields = {};
    if (Object.keys(sent).length > 0) {
      const { resource, key } = row;
      const whole = keepHidden(this.writer, resource, key, row.fields, sent);
      const fields = checkedFields(resource, key, { ...row.fields, ...whole });
      for (const name of Object.keys(sent)) {
        before[name] = row.fields[name] ?? null;
        after[name] = fields[name] ?? null;
      }
      row.fields = fields;
      this.touched.add(row);
    }
    if (position !== undefined) {
      before.position = row.position;
      this.move(row, position);
      after.position = row.position;
    }
    return { before, after };
  }

  private remove(change: Change): Omit<Effect, 'change'> {
    const { resource, key } = change;
    if (resource === 'production')
      throw new Refusal('wrong-fields', 'A production is not removed by a change. Delete it on the start page.');
    const row = this.rows.get(resource, key);
    if (!row) throw this.unknown(change);
    if (row.removed) return { before: null, after: null };
    row.removed = true;
    this.touched.add(row);
    return { before: row.fields, after: null };
  }

  private restore(change: Change): Omit<Effect, 'change'> {
    const { resource, key } = change;
    const row = this.rows.get(resource, key);
    if (!row) throw this.unknown(change);
    if (!row.removed) return { before: row.fields, after: row.fields };
    row.removed = false;
    this.touched.add(row);
    return { before: null, after: row.fields };
  }

  private standing(change: Change): KnownRow {
    const row = this.rows.get(change.resource, change.key);
    if (!row) throw this.unknown(change);
    if (row.removed)
      throw new Refusal('conflict', `Somebody removed ${wordsFor(row.resource, row.key)}. Bring it back first, then change it.`);
    return row;
  }

  private unknown({ resource, key }: Change): Refusal {
    return new Refusal('conflict', `There is no such thing as ${wordsFor(resource, key)}. Load the page again.`);
  }

  /** The rows of the list in which this one stands, in their order. */
  private siblings(row: KnownRow): KnownRow[] {
    const song = row.resource === 'parts' ? songOfKey(row.key) : null;
    return this.rows
      .all()
      .filter((one) => one.resource === row.resource && !one.removed && (song === null || songOfKey(one.key) === song))
      .sort((a, b) => a.position - b.position || (a.key < b.key ? -1 : 1));
  }

  private readonly ends = new Map<string, number>();

  private nextPosition(row: KnownRow): number {
    const list = row.resource === 'parts' ? `parts ${songOfKey(row.key)}` : row.resource;
    const end =
      this.ends.get(list) ??
      Math.max(
        -1,
        ...this.siblings(row)
          .filter((one) => one !== row)
          .map((one) => one.position),
      );
    this.ends.set(list, end + 1);
    return end + 1;
  }

  /** Puts a row at a place in its list; those that make room are touched too. */
  private move(row: KnownRow, position: unknown): void {
    if (!Number.isInteger(position) || Number(position) < 0 || row.resource === 'production')
      throw new Refusal('wrong-fields', 'The place in the list should be a whole number from 0. Correct it and send it again.', [
        { path: `${row.resource}.${row.key}.position`, expected: 'a whole number of at least 0' },
      ]);
    const others = this.siblings(row).filter((one) => one !== row);
    others.splice(Number(position), 0, row);
    this.ends.clear();
    others.forEach((one, at) => {
      if (one.position === at) return;
      one.position = at;
      this.touched.add(one);
    });
    this.touched.add(row);
  }
}
