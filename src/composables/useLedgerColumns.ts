import { computed, type ComputedRef, shallowRef, watch } from 'vue';
import type { Part } from '../../shared/contracts/resources';
import { rowSchemas } from '../../shared/contracts/rows';
import { songOfKey } from '../../shared/domain/changes';
import { type ColumnKey, columnKey, columnsInOrder, type Ledger, type LedgerColumn } from '../../shared/domain/ledgerTable';
import { partName } from '../../shared/domain/sheets/names';
import { useProduction } from '../stores/production';

export interface LedgerColumns {
  columns: ComputedRef<LedgerColumn[]>;
  addColumn: (name: string) => void;
  renameColumn: (key: ColumnKey, name: string) => void;
  forgetColumn: (key: ColumnKey) => void;
  /** The part that stood in an empty cell before it was removed. */
  removedPart: (song: string, column: ColumnKey) => Part | undefined;
}

/**
 * The columns of the ledger as they stand during a visit: none moves or vanishes under the hand of whoever types, and those that were
 * just named and hold nothing yet are there too.
 */
export function useLedgerColumns(ledger: () => Ledger): LedgerColumns {
  const production = useProduction();
  const order = shallowRef<readonly Pick<LedgerColumn, 'key' | 'name'>[]>([]);
  watch(
    () => ledger().columns,
    (next) => (order.value = columnsInOrder(order.value, next)),
    { immediate: true, flush: 'sync' },
  );
  const columns = computed(() => {
    const filled = new Map(ledger().columns.map((column) => [column.key, column]));
    return order.value.map(({ key, name }) => filled.get(key) ?? { key, name, minutes: 0 });
  });

  function addColumn(name: string): void {
    order.value = columnsInOrder([...order.value, { key: columnKey(name), name: name.trim() }], []);
  }

  function renameColumn(key: ColumnKey, name: string): void {
    order.value = columnsInOrder(
      order.value.map((column) => (column.key === key ? { key: columnKey(name), name: name.trim() } : column)),
      [],
    );
  }

  function forgetColumn(key: ColumnKey): void {
    order.value = order.value.filter((column) => column.key !== key);
  }

  function removedPart(song: string, column: ColumnKey): Part | undefined {
    for (const row of production.rows.values()) {
      if (row.resource !== 'parts' || !row.removed || songOfKey(row.key) !== song) continue;
      const part = rowSchemas.parts.safeParse(row.fields);
      if (part.success && columnKey(partName(part.data)) === column) return part.data;
    }
    return undefined;
  }

  return { columns, addColumn, renameColumn, forgetColumn, removedPart };
}
