import { toValue, watchEffect, type MaybeRefOrGetter } from 'vue';

/** The title of the window, most particular first: `Songs · Nine Sluices · Redpoll`. */
export function usePageTitle(...parts: MaybeRefOrGetter<string | undefined>[]): void {
  watchEffect(() => {
    document.title = [...parts.map((part) => toValue(part)).filter(Boolean), 'Redpoll'].join(' · ');
  });
}
