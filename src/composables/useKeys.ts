import { onScopeDispose, type Ref } from 'vue';
import { useEventListener } from '@vueuse/core';
import { type KeyLine, usePage } from '../stores/page';

export interface KeyBinding {
  /** `Alt+ArrowUp`, `Ctrl+Enter`, `p`, `?`; letters in small, whatever the Shift key says. */
  key: string;
  /** How the list of keys writes it: `Alt+↑`. Left out, the key is not listed (another line speaks for it). */
  shown?: string[];
  does?: string;
  /** Answers false where the key means nothing at this moment; then it is left to others. */
  run: (event: KeyboardEvent) => boolean | void;
}

/** Which key was pressed, modifiers first. Ctrl also stands for ⌘. */
export function chordOf(event: KeyboardEvent): string {
  const letter = event.key.length === 1;
  return [
    event.ctrlKey || event.metaKey ? 'Ctrl+' : '',
    event.altKey ? 'Alt+' : '',
    event.shiftKey && (!letter || event.ctrlKey || event.metaKey) ? 'Shift+' : '',
    letter ? event.key.toLowerCase() : event.key,
  ].join('');
}

/** Whether the key belongs to something that is being typed into. */
export function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && (target.isContentEditable || target.matches('input, textarea, select, [role="combobox"]'));
}

/**
 * Keys that hold while `within` has the focus (WCAG 2.1.4: single letters never outside of it), and their lines in the list of keys.
 */
export function useKeys(
  where: string,
  within: Ref<HTMLElement | null | undefined>,
  bindings: KeyBinding[],
  /** Lines for keys that are bound elsewhere, or that several bindings share. */
  shared: KeyLine[] = [],
): void {
  const page = usePage();
  const byKey = new Map(bindings.map((binding) => [binding.key, binding]));
  useEventListener(within, 'keydown', (event: KeyboardEvent) => {
    if (event.defaultPrevented || event.isComposing || isTyping(event.target)) return;
    const binding = byKey.get(chordOf(event));
    if (binding && binding.run(event) !== false) {
      event.preventDefault();
      event.stopPropagation();
    }
  });
  const lines = [...shared, ...bindings.flatMap(({ shown, does }) => (shown && does ? [{ keys: shown, does }] : []))];
  if (lines.length > 0) onScopeDispose(page.addKeys({ where, lines }));
}
