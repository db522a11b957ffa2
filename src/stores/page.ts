import { defineStore } from 'pinia';
import { computed, ref, shallowRef } from 'vue';

/** A key that holds on the page at hand, as the list of keys shows it. */
export interface KeyLine {
  /** One or more ways to press it: `Alt+↑`, `L`. */
  keys: string[];
  does: string;
}
export interface KeyGroup {
  where: string;
  lines: KeyLine[];
}

/** What concerns the page as a whole: the keys that hold here and what was last said aloud. */
export const usePage = defineStore('page', () => {
  const groups = shallowRef<ReadonlyMap<symbol, KeyGroup>>(new Map());
  const keyGroups = computed(() => [...groups.value.values()]);
  const announcement = ref('');
  const keysOpen = ref(false);
  /** What went wrong with the page itself, in a sentence. */
  const trouble = ref<string>();

  /** How many pages were opened in this visit; the first one does not take the focus. */
  const visits = ref(0);
  function arrive(): void {
    visits.value += 1;
  }

  function addKeys(group: KeyGroup): () => void {
    const id = Symbol(group.where);
    groups.value = new Map(groups.value).set(id, group);
    return () => {
      const rest = new Map(groups.value);
      rest.delete(id);
      groups.value = rest;
    };
  }

  /** Says a sentence to whoever listens to the page; the same sentence twice is said twice. */
  function announce(sentence: string): void {
    announcement.value = announcement.value === sentence ? `${sentence}\u00a0` : sentence;
  }

  return { keyGroups, announcement, keysOpen, trouble, visits, arrive, addKeys, announce };
});
