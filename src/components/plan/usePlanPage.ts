import { computed, type ComputedRef } from 'vue';
import type { CallChange } from '../../../shared/contracts/api';
import type { ProductionFile } from '../../../shared/contracts/resources';
import type { PassId } from '../../../shared/domain/flavours';
import { passName } from '../../../shared/domain/passes';
import { hiddenPaths, may } from '../../../shared/domain/policy';
import { namesOf } from '../../../shared/domain/sheets/names';
import { callChanges } from '../../../shared/planner/callChanges';
import { type PlanDay, planDays } from '../../../shared/planner/day';
import { effectivePasses } from '../../../shared/planner/derive';
import { hasPrices, planMoney } from '../../../shared/planner/money';
import { findPass } from '../../../shared/planner/moves';
import { whyHere } from '../../../shared/planner/reasons';
import { planSummary, type PlanSummary } from '../../../shared/planner/summary';
import { usePlan } from '../../stores/plan';
import { useProduction } from '../../stores/production';
import { type PlanFigure, planFigures } from './figures';
import { type PassFact, passFacts } from './passFacts';
import { type PersonWaits, waitsOf } from './waits';

/** A pass as the detail shows it. */
export interface PassDetail {
  code: string | null;
  label: string;
  place: string | null;
  facts: PassFact[];
  reasons: string[];
  pinned: boolean;
  leftOut: boolean;
}

/** Why there is nothing to plan yet, and where to go. */
export interface NothingYet {
  says: string;
  section: 'songs' | 'rooms';
  link: string;
}

/** Everything the plan page shows, made from the production and the plan to draw. */
export function usePlanPage(): {
  file: ComputedRef<ProductionFile>;
  days: ComputedRef<PlanDay[]>;
  summary: ComputedRef<PlanSummary | null>;
  figures: ComputedRef<PlanFigure[]>;
  subtitle: ComputedRef<string>;
  nothingYet: ComputedRef<NothingYet | null>;
  waits: ComputedRef<PersonWaits[]>;
  affected: ComputedRef<CallChange[]>;
  nameOf: (person: string) => string;
  detailOf: (pass: PassId) => PassDetail | null;
} {
  const production = useProduction();
  const plan = usePlan();
  const file = computed(() => production.file);
  const days = computed(() => (plan.drawn ? planDays(file.value, plan.drawn) : []));
  const summary = computed(() => (plan.drawn ? planSummary(file.value, plan.drawn) : null));
  const seesMoney = computed(() => !(hiddenPaths({ role: production.role, person: null }, 'rooms', '')?.includes('price') ?? true));
  const money = computed(() => (plan.drawn && seesMoney.value && hasPrices(file.value) ? planMoney(file.value, plan.drawn) : null));
  /** An old plan is news to whoever can plan again; everybody else reads what was published. */
  const wantsPlanning = computed(() => plan.stale && !plan.failed && may(production.role, 'plan'));
  const figures = computed(() => (summary.value ? planFigures(summary.value, money.value, wantsPlanning.value) : []));

  const subtitle = computed(() => {
    if (!plan.drawn) return '';
    if (!plan.solving && plan.shown?.version) return `version ${plan.shown.version}, published`;
    return plan.latest ? `draft after version ${plan.latest.number}` : 'draft, nothing published yet';
  });
  const nothingYet = computed((): NothingYet | null => {
    if (effectivePasses(file.value).length === 0)
      return {
        says: 'There is nothing to plan yet. Write down a song and say how its parts are recorded.',
        section: 'songs',
        link: 'To the songs',
      };
    if (!file.value.rooms.some(({ open }) => open.length > 0))
      return { says: 'No room has hours yet. Say when a room is yours.', section: 'rooms', link: 'To the rooms' };
    return null;
  });
  const waits = computed(() => (plan.drawn ? waitsOf(file.value, plan.drawn) : []));
  const affected = computed(() => callChanges(plan.published?.outcome.calls ?? null, plan.shown?.outcome.calls ?? []));

  function detailOf(pass: PassId): PassDetail | null {
    const known = namesOf(file.value).pass(pass);
    if (!known) return null;
    const found = findPass(days.value, pass);
    const room = found?.day.rooms.find(({ id }) => id === found.item.room)?.name;
    return {
      ...passName(file.value, known),
      place: found ? [`${found.day.title}, ${found.item.starts}–${found.item.ends}`, room].filter(Boolean).join(', ') : null,
      facts: passFacts(file.value, pass),
      reasons: plan.drawn ? whyHere(file.value, plan.drawn, pass) : [],
      pinned: known.pin !== undefined,
      leftOut: known.leftOut ?? false,
    };
  }

  return {
    file,
    days,
    summary,
    figures,
    subtitle,
    nothingYet,
    waits,
    affected,
    nameOf: (person) => namesOf(file.value).short(person),
    detailOf,
  };
}
