import { computed, type ComputedRef, ref, type Ref } from 'vue';
import { chordOf } from './useKeys';

/** A place in a grid; −1 is the header row or the header column. */
export interface GridPlace {
  row: number;
  column: number;
}

export interface GridSize {
  rows: number;
  columns: number;
}

/** How far PageUp and PageDown go. */
const PAGE = 8;

const MOVES: Readonly<Record<string, (at: GridPlace, size: GridSize) => GridPlace>> = {
  ArrowUp: (at) => ({ ...at, row: at.row - 1 }),
  ArrowDown: (at) => ({ ...at, row: at.row + 1 }),
  ArrowLeft: (at) => ({ ...at, column: at.column - 1 }),
  ArrowRight: (at) => ({ ...at, column: at.column + 1 }),
  Home: (at) => ({ ...at, column: -1 }),
  End: (at, size) => ({ ...at, column: size.columns - 1 }),
  'Ctrl+Home': () => ({ row: 0, column: 0 }),
  'Ctrl+End': (_at, size) => ({ row: size.rows - 1, column: size.columns - 1 }),
  PageUp: (at) => ({ ...at, row: Math.max(Math.min(at.row, 0), at.row - PAGE) }),
  PageDown: (at, size) => ({ ...at, row: Math.min(size.rows - 1, at.row + PAGE) }),
};

export interface Grid {
  /** Where the grid stands: kept inside its size, so it is always a place there is. */
  place: ComputedRef<GridPlace>;
  go: (to: GridPlace) => void;
  /** The place a key leads to; undefined where it is no key of movement. */
  placeAfter: (event: KeyboardEvent) => GridPlace | undefined;
}

/** Movement in a grid by the WAI-ARIA pattern: arrows, Home, End, PageUp, PageDown, Ctrl+Home, Ctrl+End; one tab stop. */
export function useGrid(size: Ref<GridSize>): Grid {
  const wanted = ref<GridPlace>({ row: 0, column: 0 });
  const within = (at: GridPlace): GridPlace => ({
    row: Math.max(-1, Math.min(at.row, size.value.rows - 1)),
    column: Math.max(-1, Math.min(at.column, size.value.columns - 1)),
  });
  const place = computed(() => within(wanted.value));
  return {
    place,
    go: (to) => (wanted.value = within(to)),
    placeAfter: (event) => {
      const move = MOVES[chordOf(event)];
      if (!move) return undefined;
      const next = within(move(place.value, size.value));
      // The corner names nothing.
      return next.row === -1 && next.column === -1 ? place.value : next;
    },
  };
}
