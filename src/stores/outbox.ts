import { computed, ref, shallowRef, type ComputedRef, type Ref, type ShallowRef } from 'vue';
import type { Change, ChangesResponse } from '../../shared/contracts/changes';
import { Refusal, Unreachable } from '../api/http';

/** Changes that go to the server together, all or none. */
export type Batch = Change[];
export type Trouble = 'none' | 'offline' | 'signed-out';

const FIRST_RETRY = 2_000;
const LAST_RETRY = 30_000;

export interface Outbox {
  /** What is not answered yet, oldest first; the first may be on its way. */
  waiting: ShallowRef<readonly Batch[]>;
  unsaved: ComputedRef<number>;
  trouble: Ref<Trouble>;
  put: (batch: Batch) => void;
  /** Sends what waits, in order, one batch at a time; after silence it tries again by itself, ever more slowly. */
  flush: () => Promise<void>;
  empty: () => void;
}

/** The queue between the page and the server. `answered` and `refused` are told what became of each batch after it has left the queue. */
export function createOutbox(
  post: (batch: Batch) => Promise<ChangesResponse>,
  told: {
    answered: (answer: ChangesResponse) => void;
    refused: (batch: Batch, refusal: Refusal) => void;
  },
): Outbox {
  const waiting = shallowRef<readonly Batch[]>([]);
  const unsaved = computed(() => waiting.value.length);
  const trouble = ref<Trouble>('none');
  let sending = false;
  let retryAfter = FIRST_RETRY;
  let timer: ReturnType<typeof setTimeout> | undefined;

  const drop = (batch: Batch): void => {
    waiting.value = waiting.value.filter((other) => other !== batch);
  };

  /** True where the next batch may go. */
  async function send(batch: Batch): Promise<boolean> {
    try {
      const answer = await post(batch);
      if (!waiting.value.includes(batch)) return true;
      told.answered(answer);
      drop(batch);
    } catch (error) {
      if (!waiting.value.includes(batch)) return true;
      if (error instanceof Unreachable || (error instanceof Refusal && (error.status >= 500 || error.status === 429))) {
        trouble.value = 'offline';
        return false;
      }
      if (error instanceof Refusal && error.status === 401) {
        trouble.value = 'signed-out';
        return false;
      }
      drop(batch);
      told.refused(batch, error instanceof Refusal ? error : new Refusal(0, 'The server’s answer could not be read. Load the page again.'));
    }
    trouble.value = 'none';
    retryAfter = FIRST_RETRY;
    return true;
  }

  async function flush(): Promise<void> {
    if (sending) return;
    sending = true;
    clearTimeout(timer);
    let onward = true;
    while (onward && waiting.value[0]) onward = await send(waiting.value[0]);
    sending = false;
    if (trouble.value === 'offline' && unsaved.value > 0) {
      timer = setTimeout(() => void flush(), retryAfter);
      retryAfter = Math.min(retryAfter * 2, LAST_RETRY);
    }
  }

  return {
    waiting,
    unsaved,
    trouble,
    put: (batch) => {
      waiting.value = [...waiting.value, batch];
      void flush();
    },
    flush,
    empty: () => {
      clearTimeout(timer);
      waiting.value = [];
      trouble.value = 'none';
    },
  };
}
