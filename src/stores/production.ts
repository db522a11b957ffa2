import { defineStore } from 'pinia';
import { computed, ref, shallowRef } from 'vue';
import type { Fault } from '../../shared/contracts/api';
import type { ChangesResponse, Row } from '../../shared/contracts/changes';
import type { Role } from '../../shared/contracts/roles';
import type { ProductionFile } from '../../shared/contracts/resources';
import { fileOf } from '../../shared/domain/changes';
import type { Edit } from '../../shared/domain/edits';
import type { Reader } from '../../shared/domain/policy';
import { postChanges } from '../api/changes';
import { readProduction } from '../api/productions';
import { newId } from './ids';
import { faultsAfter, revived, rowKey, rowsAfter, type Rows, toChanges } from './optimism';
import { type Batch, createOutbox } from './outbox';

/** What was not taken, with what was typed, so that it can be tried again or let go. */
export interface RefusedEdits {
  id: string;
  says: string;
  faults: Fault[];
  edits: Edit[];
}
/** What stands before a production is opened. */
const NOTHING: ProductionFile = {
  production: { code: '', title: '', timezone: 'UTC' },
  rooms: [],
  people: [],
  gear: [],
  setups: [],
  changeovers: [],
  songs: [],
  events: [],
};
export type Saving = 'saved' | 'saving' | 'offline' | 'signed-out' | 'refused';

function wordsFor(saving: Saving, unsaved: number, refused: number): string {
  const waits = unsaved === 1 ? '1 change waits' : `${unsaved} changes wait`;
  switch (saving) {
    case 'offline':
      return `${waits} for the server`;
    case 'signed-out':
      return `signed out · ${waits}`;
    case 'refused':
      return refused === 1 ? '1 change not taken' : `${refused} changes not taken`;
    case 'saving':
      return 'saving';
    case 'saved':
      return 'all saved';
  }
}

/**
 * The production on the page: rows as the server has them, and on top of them what was changed here and is not answered yet.
 * Taking a refused batch away is the roll-back.
 */
export const useProduction = defineStore('production', () => {
  const id = ref<string | null>(null);
  const role = ref<Role>('guest');
  /** Which of the people whoever is here is, if any. */
  const person = ref<string | null>(null);
  const reader = computed<Reader>(() => ({ role: role.value, person: person.value }));
  const version = ref<number | null>(null);
  const revision = ref(0);
  const stored = shallowRef<Rows>(new Map());
  const refused = shallowRef<readonly RefusedEdits[]>([]);

  const outbox = createOutbox(post, { answered: takeAnswer, refused: keepBatch });
  const rows = computed<Rows>(() =>
    outbox.waiting.value.reduce<Rows>((made, batch) => rowsAfter(made, batch, revision.value), stored.value),
  );
  const file = computed(() => (rows.value.size > 0 ? fileOf([...rows.value.values()]) : NOTHING));

  const saving = computed<Saving>(() => {
    if (outbox.unsaved.value > 0) return outbox.trouble.value === 'none' ? 'saving' : outbox.trouble.value;
    return refused.value.length > 0 ? 'refused' : 'saved';
  });
  const savingWords = computed(() => wordsFor(saving.value, outbox.unsaved.value, refused.value.length));

  function post(batch: Batch): Promise<ChangesResponse> {
    const based = batch.map((change) => (change.op === 'create' ? change : { ...change, base: revision.value }));
    return postChanges(id.value ?? '', based);
  }

  function take(fresh: Row[], at: number): void {
    const next = new Map(stored.value);
    for (const row of fresh) next.set(rowKey(row.resource, row.key), row);
    stored.value = next;
    revision.value = Math.max(revision.value, at);
  }

  function takeAnswer(answer: ChangesResponse): void {
    const missed = answer.revision > revision.value + 1;
    // Until what others wrote in between is here too, the production is not known up to the answer's revision.
    take(answer.rows, missed ? revision.value : answer.revision);
    if (missed) catchUp();
  }

  function keepBatch(batch: Batch, refusal: { message: string; faults: Fault[] }): void {
    keepRefused(refusal.message, refusal.faults, batch);
    // Often somebody else was there first; what they wrote shows why.
    catchUp();
  }

  /** Brings what was missed; where that fails, the next answer asks for it again, because the revision has not moved. */
  function catchUp(): void {
    refresh().catch((reason: unknown) => console.info('what others wrote could not be fetched yet', reason));
  }

  function keepRefused(says: string, faults: Fault[], edits: Edit[]): void {
    refused.value = [...refused.value, { id: newId(), says, faults, edits }];
  }

  /** Opens a production; what belonged to the one before is let go. Throws where the server refuses. */
  async function load(production: string): Promise<void> {
    if (id.value !== production) close();
    id.value = production;
    const answer = await readProduction(production);
    if (id.value !== production) return;
    stored.value = new Map();
    role.value = answer.role;
    person.value = answer.person;
    version.value = answer.version;
    take(answer.rows, answer.revision);
  }

  function close(): void {
    outbox.empty();
    id.value = null;
    stored.value = new Map();
    refused.value = [];
    revision.value = 0;
    version.value = null;
    role.value = 'guest';
    person.value = null;
  }

  /** Brings what was written since the revision at hand, by others too. */
  async function refresh(): Promise<void> {
    const production = id.value;
    if (!production) return;
    const answer = await readProduction(production, revision.value);
    if (id.value !== production) return;
    role.value = answer.role;
    person.value = answer.person;
    version.value = answer.version;
    take(answer.rows, answer.revision);
  }

  /**
   * Applies edits at once and sends them; true where they stand on the page. What the contract does not allow changes nothing and
   * is kept as refused; a refusal of the server arrives later in the same list.
   */
  function apply(wanted: Edit[]): boolean {
    if (wanted.length === 0 || !id.value) return true;
    const edits = revived(rows.value, wanted);
    const faults = faultsAfter(rows.value, edits);
    if (faults.length > 0) {
      keepRefused(`Not changed: expected ${[...new Set(faults.map((fault) => fault.expected))].join('; ')}.`, faults, wanted);
      return false;
    }
    outbox.put(toChanges(edits, newId));
    return true;
  }

  function letGo(refusal: string): void {
    refused.value = refused.value.filter((entry) => entry.id !== refusal);
  }

  function retry(refusal: string): void {
    const entry = refused.value.find((candidate) => candidate.id === refusal);
    if (!entry) return;
    letGo(refusal);
    apply(entry.edits);
  }

  return {
    id,
    role,
    reader,
    version,
    revision,
    rows,
    file,
    saving,
    savingWords,
    unsaved: outbox.unsaved,
    refused,
    load,
    close,
    refresh,
    apply,
    retry,
    letGo,
    flush: outbox.flush,
  };
});
