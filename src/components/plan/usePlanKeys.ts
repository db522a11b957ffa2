import type { Ref } from 'vue';
import type { PassId } from '../../../shared/domain/flavours';
import type { Direction } from '../../../shared/planner/moves';
import { useKeys, type KeyBinding } from '../../composables/useKeys';
import type { Step } from './navigation';

interface PlanKeys {
  selected: Ref<PassId | null>;
  step: (pass: PassId, step: Step) => void;
  move: (pass: PassId, direction: Direction) => void;
  pin: (pass: PassId) => void;
  why: (pass: PassId) => void;
  leaveOut: (pass: PassId) => void;
  open: (pass: PassId) => void;
  /** False where there was nothing to leave. */
  leave: () => boolean;
}

/** The keys that hold while a pass of the plan has the focus. */
export function usePlanKeys(within: Ref<HTMLElement | null>, keys: PlanKeys): void {
  const withPass = (does: (pass: PassId) => void) => (event: KeyboardEvent) => {
    const onPass = event.target instanceof HTMLElement && event.target.dataset.pass !== undefined;
    if (!onPass || keys.selected.value === null) return false;
    does(keys.selected.value);
    return true;
  };
  const steps: [string, Step][] = [
    ['ArrowUp', 'up'],
    ['ArrowDown', 'down'],
    ['ArrowLeft', 'left'],
    ['ArrowRight', 'right'],
    ['Home', 'first'],
    ['End', 'last'],
  ];
  const moves: [string, Direction][] = [
    ['Alt+ArrowUp', 'earlier'],
    ['Alt+ArrowDown', 'later'],
    ['Alt+ArrowLeft', 'dayBefore'],
    ['Alt+ArrowRight', 'dayAfter'],
  ];
  const listed: Record<string, Pick<KeyBinding, 'shown' | 'does'>> = {
    ArrowUp: { shown: ['↑', '↓'], does: 'to the pass before or after' },
    ArrowLeft: { shown: ['←', '→'], does: 'to the day before or after' },
    Home: { shown: ['Home', 'End'], does: 'to the first or last pass of the day' },
    'Alt+ArrowUp': { shown: ['Alt+↑', 'Alt+↓'], does: 'changes places with the pass before or after, and pins it there' },
    'Alt+ArrowLeft': { shown: ['Alt+←', 'Alt+→'], does: 'puts it on the day before or after' },
  };
  useKeys('Plan, on a pass', within, [
    ...steps.map(([key, step]) => ({ key, ...listed[key], run: withPass((pass) => keys.step(pass, step)) })),
    ...moves.map(([key, direction]) => ({ key, ...listed[key], run: withPass((pass) => keys.move(pass, direction)) })),
    { key: 'p', shown: ['P'], does: 'pins it where it is, or unpins it', run: withPass(keys.pin) },
    { key: 'w', shown: ['W'], does: 'says why it is here', run: withPass(keys.why) },
    { key: 'x', shown: ['X'], does: 'leaves it out', run: withPass(keys.leaveOut) },
    { key: 'Enter', shown: ['Enter'], does: 'opens it', run: withPass(keys.open) },
    { key: 'Escape', shown: ['Esc'], does: 'leaves it', run: () => keys.leave() },
  ]);
}
