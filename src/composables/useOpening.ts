import { ref, shallowRef, type Ref, type ShallowRef } from 'vue';
import { useRouter } from 'vue-router';
import type { Fault } from '../../shared/contracts/api';
import { Refusal, sentenceOf } from '../api/http';
import { createProduction, importProduction } from '../api/productions';
import { useSession } from '../stores/session';

/** A file that was read, with what is odd about it, or that could not be, with all that is wrong in it. */
export interface ImportOutcome {
  file: string;
  id: string | null;
  says: string;
  faults: Fault[];
}

export interface Opening {
  /** What is being done, in words; undefined when nothing is. */
  busy: Ref<string | undefined>;
  error: Ref<string | undefined>;
  outcome: ShallowRef<ImportOutcome | undefined>;
  beginFrom: (slug: string, title: string) => Promise<void>;
  beginNew: (production: { code: string; title: string; timezone: string }) => Promise<void>;
  importFile: (file: File) => Promise<void>;
}

const yaml = /\.ya?ml$/i;

/** The ways into a production: a starting point, an empty one, a file. Whoever is not signed in gets a trial where one may be opened. */
export function useOpening(): Opening {
  const router = useRouter();
  const session = useSession();
  const busy = ref<string>();
  const error = ref<string>();
  const outcome = shallowRef<ImportOutcome>();

  async function doing(words: string, work: () => Promise<void>): Promise<void> {
    if (busy.value) return;
    busy.value = words;
    error.value = undefined;
    outcome.value = undefined;
    try {
      if (await session.ensureUser()) await work();
      else await router.push({ name: 'account', query: { next: '/' } });
    } catch (reason) {
      error.value = sentenceOf(reason);
    } finally {
      busy.value = undefined;
    }
  }

  const beginFrom = (slug: string, title: string): Promise<void> =>
    doing(`Opening ${title}`, async () => {
      const { id } = await createProduction({ from: slug });
      await router.push({ name: 'plan', params: { id } });
    });

  const beginNew = (production: { code: string; title: string; timezone: string }): Promise<void> =>
    doing(`Making ${production.title}`, async () => {
      const { id } = await createProduction(production);
      await router.push({ name: 'songs', params: { id } });
    });

  const importFile = (file: File): Promise<void> =>
    doing(`Reading ${file.name}`, async () => {
      try {
        const { id, warnings } = await importProduction(file);
        if (warnings.length === 0) await router.push({ name: 'songs', params: { id } });
        else outcome.value = { file: file.name, id, says: warningsSay(warnings.length), faults: warnings };
      } catch (reason) {
        if (!(reason instanceof Refusal)) throw reason;
        const hint = yaml.test(file.name) || reason.faults.length > 0 ? '' : ' A production file is YAML and ends in .yaml.';
        outcome.value = { file: file.name, id: null, says: reason.message + hint, faults: reason.faults };
      }
    });

  return { busy, error, outcome, beginFrom, beginNew, importFile };
}

const warningsSay = (count: number): string =>
  count === 1
    ? 'It was imported. One thing in it is not known to Redpoll and is kept as it is.'
    : `It was imported. ${count} things want a look; nothing was dropped.`;
