// @vitest-environment happy-dom
import { flushPromises, mount } from '@vue/test-utils';
import { afterEach, describe, expect, it } from 'vitest';
import { createMemoryHistory, createRouter } from 'vue-router';
import type { NoPlan } from '../../shared/contracts/plan';
import { callChanges } from '../../shared/planner/callChanges';
import { planMoney } from '../../shared/planner/money';
import { planSummary } from '../../shared/planner/summary';
import { boundInWords, movedInWords, planFigures } from '../../src/components/plan/figures';
import { passFacts } from '../../src/components/plan/passFacts';
import PlanConflicts from '../../src/components/plan/PlanConflicts.vue';
import PlanDetail from '../../src/components/plan/PlanDetail.vue';
import PlanLeftOut from '../../src/components/plan/PlanLeftOut.vue';
import PlanNumbers from '../../src/components/plan/PlanNumbers.vue';
import PlanPublish from '../../src/components/plan/PlanPublish.vue';
import { sampleFile, samplePlan } from '../factories/plan-sample';

const file = sampleFile();

function router() {
  const page = { template: '<p />' };
  return createRouter({
    history: createMemoryHistory(),
    routes: [
      { path: '/', component: page },
      ...['songs', 'people', 'rooms'].map((name) => ({ path: `/p/:id/${name}`, name, component: page })),
    ],
  });
}
const button = (wrapper: ReturnType<typeof mount>, words: string) => wrapper.findAll('button').find((one) => one.text().startsWith(words))!;

afterEach(() => {
  document.body.innerHTML = '';
});

describe('the number line', () => {
  it('says musts, odds, waiting, changeovers and money, and never a cost point', () => {
    const plan = { ...samplePlan(), cost: { ...samplePlan().cost, total: 98765 } };
    plan.calls[4]!.waiting = 55;
    const figures = planFigures(planSummary(file, plan), planMoney(file, plan), false);
    const text = mount(PlanNumbers, { props: { figures } }).text();
    for (const words of [
      '5 of 5',
      'musts placed',
      '8 in 10',
      '55 min',
      'most: Mara 55 min Tue',
      '45 min',
      '€\u00a01\u202f685',
      '1 left out',
    ])
      expect(text).toContain(words);
    expect(text).not.toContain('98765');
  });

  it('leaves money out for whoever does not see it, and says when the plan is old', () => {
    const figures = planFigures(planSummary(file, samplePlan()), null, true);
    expect(figures.some(({ figure }) => figure.includes('€'))).toBe(false);
    expect(figures.filter(({ look }) => look).map(({ figure }) => figure)).toEqual(['out of date', '1 left out']);
  });

  it('says how far from the best a plan may be, only as far as it is known', () => {
    expect(boundInWords({ cost: { total: 1000 }, bound: 1000 })).toBe('proven best');
    expect(boundInWords({ cost: { total: 1000 }, bound: 921 })).toBe('at most 8 % better is possible');
    expect(boundInWords({ cost: { total: 1000 }, bound: 450 })).toBe('not proven best');
    expect(boundInWords({ cost: { total: 1000 }, bound: 0 })).toBe('not proven best');
  });

  it('counts what moved between two plans', () => {
    const after = samplePlan();
    after.items[3] = { ...after.items[3]!, start: '2027-03-08T14:45', end: '2027-03-08T16:00' };
    expect(movedInWords(samplePlan(), after)).toBe('1 of 6 passes moved');
    expect(movedInWords(samplePlan(), samplePlan())).toBe('nothing moved');
  });
});

describe('no plan', () => {
  const none = (status: NoPlan['status'], conflicts: NoPlan['conflicts']): NoPlan => ({
    ...{ status, conflicts, cost: null, bound: null, seconds: 1, items: [], calls: [], unplaced: [], odds: null },
  });
  const shown = (failed: NoPlan) =>
    mount(PlanConflicts, { props: { failed, file, production: 'p1', mayChange: true }, global: { plugins: [router()] } });

  it('says which facts clash, with the way to each, and mends on the spot what can be', async () => {
    const wrapper = shown(
      none('impossible', [
        { facts: ['people.lys.windows', 'passes.s1-horns', 'rooms.a.open', 'passes.s1-basics.pin'], says: 'Lys is free only until 17:00.' },
      ]),
    );
    expect(wrapper.text()).toContain('Lys is free only until 17:00.');
    const links = wrapper.findAll('a').map((link) => [link.text(), link.attributes('href')]);
    expect(links).toEqual([
      ['Lys: hours', '/p/p1/people'],
      ['Room A: hours', '/p/p1/rooms'],
    ]);
    await button(wrapper, 'Unpin S1 Weir Song').trigger('click');
    await button(wrapper, 'Leave S1 horns out').trigger('click');
    expect(wrapper.emitted('mend')).toEqual([[{ does: 'unpin', pass: 's1-basics' }], [{ does: 'leaveOut', pass: 's1-horns' }]]);
  });

  it('does not claim what is not known, and offers the next step', async () => {
    const wrapper = shown(none('unsolved', []));
    expect(wrapper.text()).toContain('It is not known whether there is one.');
    expect(wrapper.text()).not.toContain('clash');
    await button(wrapper, 'Look for a minute').trigger('click');
    expect(wrapper.emitted('longer')).toHaveLength(1);
  });
});

describe('a pass in full', () => {
  it('says its facts in words', () => {
    expect(passFacts(file, 's1-basics')).toEqual([
      { label: 'Parts', words: 'live: drums · guide: lead' },
      { label: 'People', words: 'Mara, Tob, Dov, Petra Montalvo' },
      { label: 'Set-up', words: 'Full kit' },
      { label: 'Minutes', words: '1 h 15 likely, 50 min to 1 h 40' },
      { label: 'Priority', words: 'must' },
      { label: 'Pinned', words: 'at 12:30 on Mon 8 March' },
    ]);
  });

  it('offers what can be done, only to those who may', async () => {
    const props = {
      ...{ code: 'S1', label: 'Weir Song', place: 'Mon 8 March, 12:30–13:45, Room A', facts: [], reasons: ['It needs the full kit.'] },
      ...{ pinned: true, leftOut: false, mayChange: true },
    };
    const wrapper = mount(PlanDetail, { props });
    expect(wrapper.text()).toContain('It needs the full kit.');
    await button(wrapper, 'Unpin').trigger('click');
    await button(wrapper, 'Later').trigger('click');
    await button(wrapper, 'Leave out').trigger('click');
    expect(wrapper.emitted()).toMatchObject({ pin: [[]], move: [['later']], leaveOut: [[]] });
    await wrapper.get('aside').trigger('keydown', { key: 'Escape' });
    expect(wrapper.emitted('close')).toHaveLength(1);
    const reader = mount(PlanDetail, { props: { ...props, mayChange: false } });
    expect(reader.findAll('button').map((one) => one.text())).toEqual(['Close']);
  });

  it('brings back by hand what was left out by hand', async () => {
    const leftOut = [
      { pass: 's3-solo', words: 'S3 trumpet solo', byHand: true },
      { pass: 's2-shaker', words: 'S2 shaker', byHand: false },
    ];
    const wrapper = mount(PlanLeftOut, { props: { leftOut, mayChange: true } });
    expect(wrapper.findAll('button')).toHaveLength(1);
    await wrapper.get('button').trigger('click');
    expect(wrapper.emitted('toggle')).toEqual([['s3-solo']]);
  });
});

describe('publishing', () => {
  it('shows who is affected before anything goes out, and Enter in the note publishes', async () => {
    const before = [...samplePlan().calls];
    before[1] = { ...before[1]!, arrive: '2027-03-08T10:00' };
    const changes = callChanges(before.slice(0, 6), samplePlan().calls.slice(1));
    const names = (id: string) => file.people.find((person) => person.id === id)?.short ?? id;
    const wrapper = mount(PlanPublish, {
      props: { open: true, changes, next: 4, stale: false, busy: false, error: null, names },
      attachTo: document.body,
    });
    await flushPromises();
    const dialog = document.querySelector('[role="dialog"]')!;
    expect(dialog.textContent).toContain('Publish as version 4');
    expect(dialog.textContent).toContain('5 people are affected.');
    expect(dialog.textContent).toContain('Mon 8 March 11:15–15:45, was 10:00–15:45');
    expect(dialog.textContent).toContain('Cancelled calls: 1');
    const note = dialog.querySelector('input')!;
    note.value = 'Horns come later.';
    note.dispatchEvent(new Event('input'));
    dialog.querySelector('form')!.dispatchEvent(new Event('submit', { cancelable: true }));
    await flushPromises();
    expect(wrapper.emitted('publish')).toEqual([['Horns come later.']]);
    wrapper.unmount();
  });
});
