import { useLocalStorage } from '@vueuse/core';
import { computed, watchEffect, type ComputedRef } from 'vue';

export type Theme = 'paper' | 'dim';

/** Paper by day, the dim room by night; kept on this device. */
export function useTheme(): { theme: ComputedRef<Theme>; setTheme: (theme: Theme) => void } {
  const kept = useLocalStorage<string>('redpoll.theme', 'paper');
  const theme = computed<Theme>(() => (kept.value === 'dim' ? 'dim' : 'paper'));
  watchEffect(() => {
    document.documentElement.dataset.theme = theme.value;
    const paper = getComputedStyle(document.documentElement).getPropertyValue('--paper').trim();
    document.querySelector('meta[name="theme-color"]')?.setAttribute('content', paper);
  });
  return { theme, setTheme: (next) => (kept.value = next) };
}
