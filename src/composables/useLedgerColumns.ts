import { computed, type ComputedRef, shallowRef } from 'vue';
import type { Part } from '../../shared/contracts/resources';
import { rowSchemas } from '../../shared/contracts/rows';
import { songOfKey } from '../../shared/domain/changes';
import type { Ledger, LedgerColumn } from '../../shared/domain/ledgerTable';
import { partName } from '../../shared/domain/sheets/names';
import { useProduction } from '../stores/production';

export interface LedgerColumns {
  columns: ComputedRef<LedgerColumn[]>;
  addColumn: (name: string) => void;
  /** The part that stood in an empty cell before it was removed. */
  removedPart: (song: string, column: string) => Part | undefined;
}

/** The columns of the ledger, with those that were named in this visit and hold nothing yet. */
export function useLedgerColumns(ledger: () => Ledger): LedgerColumns {
  const production = useProduction();
  const added = shallowRef<readonly LedgerColumn[]>([]);
  const columns = computed(() => {
    const known = new Set(ledger().columns.map(({ key }) => key));
    return [...ledger().columns, ...added.value.filter(({ key }) => !known.has(key))];
  });

  function addColumn(name: string): void {
    const key = name.trim().toLowerCase();
    if (!columns.value.some((column) => column.key === key)) added.value = [...added.value, { key, name: name.trim(), minutes: 0 }];
  }

  function removedPart(song: string, column: string): Part | undefined {
    for (const row of production.rows.values()) {
      if (row.resource !== 'parts' || !row.removed || songOfKey(row.key) !== song) continue;
      const part = rowSchemas.parts.safeParse(row.fields);
      if (part.success && partName(part.data).trim().toLowerCase() === column) return part.data;
    }
    return undefined;
  }

  return { columns, addColumn, removedPart };
}
