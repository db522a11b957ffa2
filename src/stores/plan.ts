import { until } from '@vueuse/core';
import { defineStore } from 'pinia';
import { computed, ref, shallowRef } from 'vue';
import type { Draft, PublishedPlan, Version } from '../../shared/contracts/api';
import type { MadePlan, NoPlan, PlanOutcome } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { may } from '../../shared/domain/policy';
import { sentenceOf } from '../api/http';
import { keepDraft, listDrafts } from '../api/plans';
import * as versionsApi from '../api/versions';
import type { PlanningProgress } from '../workers/plan.worker';
import { startPlanning, type PlanningRun } from '../workers/planning';
import { useProduction } from './production';

/** The plan on the page. */
export interface ShownPlan {
  outcome: MadePlan;
  seed: number;
  iterations: number;
  /** Revision of the production it was made from. */
  inputRevision: number;
  /** What it was made from, where it was made on this page. */
  madeFrom: string | null;
  /** The draft on the server; null until it is kept there. */
  draft: string | null;
  /** The number under which it was published. */
  version: number | null;
}

/** A search that is going on. */
export interface Solving {
  seconds: number;
  begun: number;
  seed: number;
  madeFrom: string;
  inputRevision: number;
  progress: PlanningProgress | null;
}

export const DEFAULT_SECONDS = 10;
/** After a pin or a move the rest is planned around it in a moment. */
export const QUICK_SECONDS = 3;

/** How long the server is given to answer what was sent before, in ms. */
const ANSWER = 15_000;

/** Fields that no plan depends on; a change of them alone does not make it old. */
const BESIDE: ReadonlySet<string> = new Set([
  ...[
    'note',
    'email',
    'phone',
    'bring',
    'food',
    'access',
    'headphones',
    'place',
    'late',
    'dress',
    'title',
    'name',
    'short',
    'key',
    'tempo',
  ],
  ...['capo', 'tuning', 'pitch', 'form', 'click', 'meter', 'plays', 'recording', 'paper', 'price', 'fallback', 'needs', 'extra'],
]);
const fingerprintOf = (file: ProductionFile): string =>
  JSON.stringify(file, (field, value: unknown) => (BESIDE.has(field) ? undefined : value));
const isMade = (outcome: PlanOutcome): outcome is MadePlan => outcome.status === 'optimal' || outcome.status === 'feasible';

/** The plan of the open production: what is drawn, what the planner is doing, and what was published. */
export const usePlan = defineStore('plan', () => {
  const production = useProduction();
  const shown = shallowRef<ShownPlan | null>(null);
  /** The plan that stood before this one was made, to say how much moved. */
  const previous = shallowRef<MadePlan | null>(null);
  const failed = shallowRef<NoPlan | null>(null);
  const solving = shallowRef<Solving | null>(null);
  const versions = shallowRef<Version[]>([]);
  const published = shallowRef<PublishedPlan | null>(null);
  /** What went wrong last, as a sentence with the next step. */
  const trouble = ref<string | null>(null);
  const opened = ref<string | null>(null);
  let run: PlanningRun | null = null;

  const fingerprint = computed(() => fingerprintOf(production.file));
  const newest = computed(() => Math.max(0, ...[...production.rows.values()].map(({ revision }) => revision)));
  /** Whether what it was made from has changed since. */
  const stale = computed(() => {
    if (!shown.value || solving.value) return false;
    if (shown.value.madeFrom !== null) return shown.value.madeFrom !== fingerprint.value;
    return newest.value > shown.value.inputRevision || production.unsaved > 0;
  });
  /** The plan to draw: the best of a running search, else the one that stands. */
  const drawn = computed<MadePlan | null>(() => solving.value?.progress?.outcome ?? shown.value?.outcome ?? null);
  const latest = computed(() =>
    versions.value.reduce<Version | null>((last, one) => (one.number > (last?.number ?? 0) ? one : last), null),
  );

  function fromDraft(draft: Draft): ShownPlan | null {
    if (!isMade(draft.outcome)) return null;
    const { outcome, seed, iterations, inputRevision, version } = draft;
    return { outcome, seed, iterations, inputRevision, madeFrom: null, draft: draft.id, version };
  }

  /** Brings the last plan of a production from the server: its newest draft, or for those who see no drafts the published version. */
  async function open(id: string): Promise<void> {
    if (opened.value !== id) close();
    opened.value = id;
    trouble.value = null;
    const drafts = may(production.role, 'readDrafts') ? await listDrafts(id) : [];
    const numbered = may(production.role, 'readVersions') ? await versionsApi.listVersions(id) : [];
    if (opened.value !== id) return;
    versions.value = numbered;
    const newestDraft = drafts.reduce<Draft | null>((last, one) => (last && last.createdAt >= one.createdAt ? last : one), null);
    if (latest.value) published.value = await versionsApi.readVersion(id, latest.value.number);
    if (opened.value !== id || shown.value?.madeFrom) return;
    shown.value = newestDraft ? fromDraft(newestDraft) : fromPublished(published.value);
  }

  function fromPublished(plan: PublishedPlan | null): ShownPlan | null {
    if (!plan || !isMade(plan.outcome)) return null;
    const { outcome, inputRevision, number } = plan;
    return { outcome, seed: 0, iterations: 0, inputRevision, madeFrom: null, draft: plan.plan, version: number };
  }

  function close(): void {
    stop();
    opened.value = null;
    shown.value = null;
    previous.value = null;
    failed.value = null;
    versions.value = [];
    published.value = null;
  }

  /** Looks for a plan, from the one that stands where there is one; one search at a time. */
  async function solve(seconds = DEFAULT_SECONDS): Promise<void> {
    stop();
    trouble.value = null;
    const file = JSON.parse(JSON.stringify(production.file)) as ProductionFile;
    const before = shown.value;
    const order = { seed: (before?.seed ?? 0) + 1, seconds, ...(before ? { start: before.outcome.items } : {}) };
    const here: Solving = {
      seconds,
      begun: performance.now(),
      seed: order.seed,
      madeFrom: fingerprint.value,
      inputRevision: production.revision,
      progress: null,
    };
    solving.value = here;
    const mine = startPlanning(file, order, (progress) => {
      if (run === mine && solving.value) solving.value = { ...solving.value, progress };
    });
    run = mine;
    try {
      const outcome = await mine.finished;
      if (run === mine) settle(outcome);
    } catch {
      if (run !== mine) return;
      if (!takeBest()) trouble.value = 'The planner stopped by itself. Plan again; if it happens twice, load the page anew.';
    }
  }

  function settle(outcome: PlanOutcome): void {
    const search = solving.value;
    run = null;
    solving.value = null;
    if (!search) return;
    if (isMade(outcome)) adopt(outcome, search);
    else failed.value = outcome;
  }

  function adopt(outcome: MadePlan, search: Solving): void {
    failed.value = null;
    previous.value = shown.value?.outcome ?? null;
    const { seed, inputRevision, madeFrom } = search;
    shown.value = { outcome, seed, iterations: search.progress?.iterations ?? 0, inputRevision, madeFrom, draft: null, version: null };
    void keep();
  }

  function takeBest(): boolean {
    const search = solving.value;
    run = null;
    solving.value = null;
    if (!search?.progress) return false;
    adopt(search.progress.outcome, search);
    return true;
  }

  /** Ends the search; the best plan so far stands. */
  function cancel(): void {
    run?.end();
    takeBest();
  }

  /** Ends the search and forgets it. */
  function stop(): void {
    run?.end();
    run = null;
    solving.value = null;
  }

  /** Takes a change that the plan already keeps (a pass pinned where it stands) for what it was made from. */
  function holdsStill(change: () => boolean): boolean {
    const fresh = !stale.value;
    const taken = change();
    if (!taken || !fresh || !shown.value) return taken;
    shown.value = { ...shown.value, madeFrom: fingerprint.value, draft: shown.value.version === null ? null : shown.value.draft };
    void keep();
    return taken;
  }

  /** Keeps the plan on the server as a draft, so that another device finds it; true when it is there. An old plan is not kept. */
  async function keep(): Promise<boolean> {
    const plan = shown.value;
    const id = production.id;
    if (!plan || !id || !may(production.role, 'plan')) return false;
    if (plan.draft) return true;
    try {
      // What is on its way comes first: a draft names the revision it was made from.
      await until(() => production.saving).not.toBe('saving', { timeout: ANSWER });
      if (plan.madeFrom !== fingerprint.value) return false;
      const { outcome, seed, iterations } = plan;
      const inputRevision = production.revision;
      const draft = await keepDraft(id, { inputRevision, seed, iterations, outcome });
      if (shown.value === plan) shown.value = { ...plan, inputRevision, draft: draft.id };
      return true;
    } catch (error) {
      trouble.value = `The plan is not kept on the server yet. ${sentenceOf(error)}`;
      return false;
    }
  }

  /** Gives the plan a number; true when it is published. */
  async function publish(note: string): Promise<boolean> {
    const id = production.id;
    trouble.value = null;
    if (!id || !(await keep()) || !shown.value?.draft) {
      trouble.value ??= 'This plan is older than the songs. Plan again, then publish.';
      return false;
    }
    try {
      const made = await versionsApi.publish(id, { plan: shown.value.draft, ...(note.trim() === '' ? {} : { note: note.trim() }) });
      versions.value = [...versions.value, made];
      shown.value = { ...shown.value, version: made.number };
      published.value = await versionsApi.readVersion(id, made.number);
      await production.refresh();
      return true;
    } catch (error) {
      trouble.value = sentenceOf(error);
      return false;
    }
  }

  return {
    shown,
    previous,
    failed,
    solving,
    versions,
    latest,
    published,
    trouble,
    stale,
    drawn,
    open,
    close,
    solve,
    cancel,
    holdsStill,
    keep,
    publish,
  };
});
