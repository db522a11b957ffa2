// @vitest-environment happy-dom
import { flushPromises, mount } from '@vue/test-utils';
import { createPinia } from 'pinia';
import { computed, defineComponent, h, ref } from 'vue';
import { describe, expect, it } from 'vitest';
import type { ProductionFile } from '../../shared/contracts/resources';
import { fileOf, rowsOf } from '../../shared/domain/changes';
import type { Edit } from '../../shared/domain/edits';
import { planDays } from '../../shared/planner/day';
import { usePlanActions } from '../../src/components/plan/usePlanActions';
import { usePlanKeys } from '../../src/components/plan/usePlanKeys';
import { rowKey, rowsAfter } from '../../src/stores/optimism';
import { sampleFile, samplePlan } from '../factories/plan-sample';

/** A desk over rows as the page keeps them, with edits applied as the store does. */
function desk(start: ProductionFile = sampleFile(), failed = false) {
  const rows = ref(
    new Map(rowsOf(start).map((row, position) => [rowKey(row.resource, row.key), { ...row, position, revision: 1, removed: false }])),
  );
  const said: string[] = [];
  const planned = ref(0);
  const apply = (edits: Edit[]): boolean => {
    rows.value = new Map(rowsAfter(rows.value, edits, 1));
    return true;
  };
  const file = computed(() => fileOf([...rows.value.values()]));
  const actions = usePlanActions({
    file,
    days: computed(() => planDays(file.value, samplePlan())),
    mayChange: computed(() => true),
    apply,
    applyInPlace: apply,
    failed: () => failed,
    replan: () => (planned.value += 1),
    say: (sentence) => said.push(sentence),
  });
  const pass = (id: string) => file.value.passes?.find((one) => one.id === id);
  return { ...actions, file, pass, said, planned };
}

describe('pins and moves on the plan', () => {
  it('pins and unpins where it stands without planning again, for the plan holds either way', () => {
    const { togglePin, pass, said, planned } = desk();
    togglePin('s2-basics');
    expect(pass('s2-basics')!.pin).toEqual({ at: '2027-03-08T14:30' });
    expect(said).toEqual(['Pinned at 14:30 on Mon 8 March.']);
    expect(planned.value).toBe(0);
    togglePin('s2-basics');
    expect(pass('s2-basics')!.pin).toBeUndefined();
    expect(planned.value).toBe(0);
  });

  it('unpins with a new plan where none holds', () => {
    const { mend, pass, planned } = desk(sampleFile(), true);
    mend({ does: 'unpin', pass: 's1-basics' });
    expect(pass('s1-basics')!.pin).toBeUndefined();
    expect(planned.value).toBe(1);
  });

  it('moves by a pin, plans again, and takes it back to what it was', () => {
    const { move, takeBack, pass, planned, last } = desk();
    move('s1-basics', 'later');
    expect(pass('s1-basics')!.pin).toEqual({ day: '2027-03-08', notBefore: '2027-03-08T14:30' });
    expect(planned.value).toBe(1);
    takeBack();
    expect(pass('s1-basics')!.pin).toEqual({ at: '2027-03-08T12:30' });
    expect(last.value).toBeNull();
    expect(planned.value).toBe(2);
  });

  it('never moves what is pinned, and says so', () => {
    const { move, pass, said, planned } = desk();
    move('s2-basics', 'earlier');
    expect(said).toEqual(['S1 Weir Song is pinned and stays. Unpin it first to change places with it.']);
    expect(pass('s2-basics')!.pin).toBeUndefined();
    expect(planned.value).toBe(0);
  });

  it('leaves out and takes in again', () => {
    const { toggleLeftOut, pass, planned } = desk();
    toggleLeftOut('s3-solo');
    expect(pass('s3-solo')!.leftOut).toBe(true);
    toggleLeftOut('s3-solo');
    expect(pass('s3-solo')!.leftOut).toBeUndefined();
    expect(planned.value).toBe(2);
  });

  it('writes every derived pass before the first is set', () => {
    const derived = sampleFile();
    delete derived.passes;
    const { toggleLeftOut, file } = desk(derived);
    expect(file.value.passes).toBeUndefined();
    toggleLeftOut('s1-horns');
    expect(file.value.passes?.map(({ id, leftOut }) => [id, leftOut ?? false])).toEqual([
      ['s1-basics', false],
      ['s1-horns', true],
      ['s2-basics', false],
      ['s3-organ', false],
    ]);
  });
});

describe('keys on the plan', () => {
  async function board() {
    const pressed: string[] = [];
    const selected = ref<string | null>('s1-basics');
    const Board = defineComponent({
      setup() {
        const within = ref<HTMLElement | null>(null);
        const note = (what: string) => (pass: string, more?: string) => void pressed.push([what, pass, more].filter(Boolean).join(' '));
        usePlanKeys(within, {
          ...{ selected, step: note('step'), move: note('move'), pin: note('pin'), why: note('why') },
          ...{ leaveOut: note('out'), open: note('open'), leave: () => pressed.push('leave') > 0 },
        });
        return () => h('div', { ref: within }, [h('div', { 'data-pass': 's1-basics', tabindex: 0 }), h('button', 'beside')]);
      },
    });
    const wrapper = mount(Board, { attachTo: document.body, global: { plugins: [createPinia()] } });
    await flushPromises();
    return { wrapper, pressed };
  }

  it('hold while a pass has the focus', async () => {
    const { wrapper, pressed } = await board();
    const pass = wrapper.get('[data-pass]');
    for (const key of ['ArrowUp', 'ArrowRight', 'End', 'p', 'W', 'x', 'Enter', 'Escape']) await pass.trigger('keydown', { key });
    await pass.trigger('keydown', { key: 'ArrowDown', altKey: true });
    await pass.trigger('keydown', { key: 'ArrowLeft', altKey: true });
    expect(pressed).toEqual([
      ...['step s1-basics up', 'step s1-basics right', 'step s1-basics last', 'pin s1-basics', 'why s1-basics', 'out s1-basics'],
      ...['open s1-basics', 'leave', 'move s1-basics later', 'move s1-basics dayBefore'],
    ]);
    wrapper.unmount();
  });

  it('mean nothing beside a pass', async () => {
    const { wrapper, pressed } = await board();
    for (const key of ['p', 'x', 'w', 'Enter', 'ArrowDown']) await wrapper.get('button').trigger('keydown', { key });
    expect(pressed).toEqual([]);
    wrapper.unmount();
  });
});
