import { useEventListener } from '@vueuse/core';
import { ref, shallowRef, type Ref, type ShallowRef } from 'vue';
import type { Minute, PassId, WallDate } from '../../../shared/domain/flavours';

/** Where a dragged pass would land. */
export interface Landing {
  pass: PassId;
  date: WallDate;
  at: Minute;
}

interface Board {
  /** The day under the pointer and the minute at that height; null beside the days. */
  placeAt: (x: number, y: number) => { date: WallDate; at: Minute } | null;
  drop: (landing: Landing) => void;
}

/** How far the pointer moves before a press becomes a drag, in px. */
const THRESHOLD = 6;

/**
 * Dragging a pass with a mouse or pen to another time or day; a finger scrolls. Escape lets go of it. The keyboard's way are the moves
 * by Alt and the arrows.
 */
export function usePassDrag({ placeAt, drop }: Board): {
  landing: ShallowRef<Landing | null>;
  dragged: Ref<boolean>;
  press: (event: PointerEvent, pass: PassId, top: number) => void;
} {
  const landing = shallowRef<Landing | null>(null);
  /** Whether the press that is ending was a drag, so that it is no click. */
  const dragged = ref(false);
  let held: { pass: PassId; x: number; y: number; grab: number } | null = null;

  function press(event: PointerEvent, pass: PassId, top: number): void {
    dragged.value = false;
    if (event.button !== 0 || event.pointerType === 'touch') return;
    held = { pass, x: event.clientX, y: event.clientY, grab: event.clientY - top };
  }

  function letGo(): void {
    held = null;
    landing.value = null;
  }

  useEventListener(window, 'pointermove', (event: PointerEvent) => {
    if (!held) return;
    if (!dragged.value && Math.hypot(event.clientX - held.x, event.clientY - held.y) < THRESHOLD) return;
    dragged.value = true;
    const place = placeAt(event.clientX, event.clientY - held.grab);
    landing.value = place && { pass: held.pass, ...place };
  });
  useEventListener(window, 'pointerup', () => {
    const target = landing.value;
    letGo();
    if (target) drop(target);
  });
  useEventListener(window, 'pointercancel', letGo);
  useEventListener(
    window,
    'keydown',
    (event: KeyboardEvent) => {
      if (event.key !== 'Escape' || !held || !dragged.value) return;
      letGo();
      event.stopPropagation();
    },
    { capture: true },
  );

  return { landing, dragged, press };
}
