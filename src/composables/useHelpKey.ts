import { useEventListener, useLocalStorage } from '@vueuse/core';
import type { Ref } from 'vue';
import { usePage } from '../stores/page';
import { isTyping } from './useKeys';

/** Whether `?` opens the list of keys anywhere; it can be switched off (WCAG 2.1.4). */
export const useHelpKeySetting = (): Ref<boolean> => useLocalStorage('redpoll.help-key', true);

/** `?` opens the list of the keys that hold here. */
export function useHelpKey(): void {
  const page = usePage();
  const anywhere = useHelpKeySetting();
  useEventListener(document, 'keydown', (event: KeyboardEvent) => {
    if (event.key !== '?' || event.ctrlKey || event.metaKey || event.altKey || event.defaultPrevented) return;
    const inGrid = event.target instanceof Element && event.target.closest('[role="grid"], [data-keys]') !== null;
    if (isTyping(event.target) || (!anywhere.value && !inGrid)) return;
    event.preventDefault();
    page.keysOpen = true;
  });
}
