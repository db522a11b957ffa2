// @vitest-environment happy-dom
import { enableAutoUnmount, mount, type VueWrapper } from '@vue/test-utils';
import { createPinia } from 'pinia';
import { nextTick } from 'vue';
import { afterEach, describe, expect, it } from 'vitest';
import { ledgerOf } from '../../shared/domain/ledgerTable';
import LedgerGrid from '../../src/components/songs/LedgerGrid.vue';
import { smallBand } from '../factories/band';

enableAutoUnmount(afterEach);

const NAMES: Record<string, string> = { tobin: 'Tobin', mara: 'Mara', oka: 'Oka', lys: 'Lys' };

function ledgerGrid({ editable = true } = {}) {
  const ledger = ledgerOf(smallBand());
  return mount(LedgerGrid, {
    attachTo: document.body,
    global: { plugins: [createPinia()] },
    props: { ledger, columns: ledger.columns, shortName: (id: string) => NAMES[id] ?? id, editable, place: { row: 0, column: 0 } },
  });
}

/** Presses keys where the focus is, one after another. */
async function press(...keys: (string | KeyboardEventInit)[]): Promise<void> {
  for (const key of keys) {
    const init = typeof key === 'string' ? { key } : key;
    document.activeElement?.dispatchEvent(new KeyboardEvent('keydown', { bubbles: true, cancelable: true, ...init }));
    await nextTick();
    await nextTick();
  }
}

async function focusFirst(grid: VueWrapper): Promise<void> {
  // The keys are listened to as soon as the page has been drawn.
  await nextTick();
  grid.find<HTMLElement>('[tabindex="0"]').element.focus();
}

const here = () => document.activeElement?.querySelector('.sr-only')?.textContent ?? document.activeElement?.textContent?.trim();

describe('the ledger by keys', () => {
  it('is one tab stop, and says what a cell holds', async () => {
    const grid = ledgerGrid();
    expect(grid.findAll('[tabindex="0"]')).toHaveLength(1);
    expect(grid.find('[role="grid"]').exists()).toBe(true);
    await focusFirst(grid);
    expect(here()).toBe('Weir Song, Drums: live, Tobin, 60 minutes');
  });

  it('moves by arrows, Home and End, with Ctrl to the corners, and stops at the edges', async () => {
    const grid = ledgerGrid();
    await focusFirst(grid);
    await press('ArrowRight');
    expect(here()).toBe('Weir Song, Lead: guide, Mara');
    await press('ArrowDown');
    expect(here()).toContain('Ropewalk, Lead: live, Mara');
    await press('ArrowDown', 'PageDown');
    expect(here()).toContain('Ropewalk, Lead');
    await press('End');
    expect(here()).toBe('Ropewalk, Trumpet: not there');
    await press({ key: 'Home', ctrlKey: true });
    expect(here()).toContain('Weir Song, Drums');
    await press({ key: 'End', ctrlKey: true });
    expect(here()).toBe('Ropewalk, Trumpet: not there');
    await press('Home');
    expect(document.activeElement?.getAttribute('scope')).toBe('row');
    await press({ key: 'Home', ctrlKey: true }, 'ArrowUp');
    expect(document.activeElement?.textContent).toBe('Drums');
    expect(grid.findAll('[tabindex="0"]')).toHaveLength(1);
  });

  it('sets a mode by its letter, small or capital, and takes a part away', async () => {
    const grid = ledgerGrid();
    await focusFirst(grid);
    await press('o', { key: 'S', shiftKey: true }, 'ArrowDown', 'r', '-', 'Delete');
    expect(grid.emitted('mode')).toEqual([
      [{ row: 0, column: 0 }, 'overdub'],
      [{ row: 0, column: 0 }, 'stack'],
      [{ row: 1, column: 0 }, 'repair'],
      [{ row: 1, column: 0 }, null],
      [{ row: 1, column: 0 }, null],
    ]);
  });

  it('leaves letters with Ctrl to the browser, and letters on names to nobody', async () => {
    const grid = ledgerGrid();
    await focusFirst(grid);
    await press({ key: 'r', ctrlKey: true }, 'Home', 'o');
    expect(grid.emitted('mode')).toBeUndefined();
  });

  it('takes digits as likely minutes with Enter or on the way out, and forgets them with Esc', async () => {
    const grid = ledgerGrid();
    await focusFirst(grid);
    await press('4', '5');
    expect(grid.find('.typed').text()).toBe('45');
    expect(grid.emitted('minutes')).toBeUndefined();
    await press('Backspace', '0', 'Enter', '7', '5', 'ArrowRight', '9', 'Escape', 'ArrowRight');
    expect(grid.emitted('minutes')).toEqual([
      [{ row: 0, column: 0 }, 40],
      [{ row: 0, column: 0 }, 75],
    ]);
  });

  it('takes no digits where there is no part', async () => {
    const grid = ledgerGrid();
    await focusFirst(grid);
    await press('ArrowDown', '5', 'Enter');
    expect(grid.emitted('minutes')).toBeUndefined();
  });

  it('opens the detail with Enter and F2', async () => {
    const grid = ledgerGrid();
    await focusFirst(grid);
    await press('Enter', 'F2');
    expect(grid.emitted('open')).toHaveLength(2);
  });

  it('changes nothing for whoever may only read', async () => {
    const grid = ledgerGrid({ editable: false });
    await focusFirst(grid);
    await press('o', '4', '5', 'Enter', '-');
    expect(grid.emitted('mode')).toBeUndefined();
    expect(grid.emitted('minutes')).toBeUndefined();
  });

  it('goes where the pointer presses', async () => {
    const grid = ledgerGrid();
    await grid.find('[data-row="1"][data-column="1"]').trigger('click');
    await nextTick();
    expect(here()).toContain('Ropewalk, Lead');
    expect(grid.emitted('update:place')?.at(-1)).toEqual([{ row: 1, column: 1 }]);
  });
});
