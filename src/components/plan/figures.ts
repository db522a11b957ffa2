import type { MadePlan, PlanItem } from '../../../shared/contracts/plan';
import { moneyInWords, oddsInWords } from '../../../shared/domain/figures';
import type { PlanMoney } from '../../../shared/planner/money';
import type { PlanSummary } from '../../../shared/planner/summary';
import { dayWords, length } from '../../../shared/time/words';

/** One entry of the number line: a figure, and what it counts. */
export interface PlanFigure {
  figure: string;
  words: string;
  look?: boolean;
}

const MOST_WARNINGS = 2;
/** A bound further off than this, in percent, says more about the proof than about the plan. */
const WORTH_SAYING = 30;
const WEEKDAY = 3;

function moneyWords({ overtime, fees, hire }: PlanMoney): string {
  const parts = ['rooms', fees > 0 ? 'fees' : null, hire > 0 ? 'hire' : null, overtime > 0 ? 'overtime' : null];
  return parts.filter((part) => part !== null).join(', ');
}

/** The number line of a plan. `money` is null for whoever does not see money, or where there are no prices. */
export function planFigures(summary: PlanSummary, money: PlanMoney | null, stale: boolean): PlanFigure[] {
  const { musts, odds, waiting, changeovers, warnings } = summary;
  const worst = waiting.worst;
  const most = worst ? `, most: ${worst.person} ${length(worst.minutes)} ${dayWords(worst.date).slice(0, WEEKDAY)}` : '';
  const old = stale ? [{ figure: 'out of date', words: 'Ctrl+Enter plans again', look: true }] : [];
  return [
    { figure: `${musts.placed} of ${musts.all}`, words: 'musts placed', look: musts.placed < musts.all },
    { figure: oddsInWords(odds), words: 'odds of all musts' },
    { figure: waiting.total === 0 ? 'none' : length(waiting.total), words: `waiting${most}` },
    { figure: changeovers === 0 ? 'none' : length(changeovers), words: 'changeovers' },
    ...(money ? [{ figure: moneyInWords(money.total, money.currency), words: moneyWords(money) }] : []),
    ...old,
    ...warnings.slice(0, MOST_WARNINGS - old.length).map(({ word, says }) => ({ figure: word, words: says, look: true })),
  ];
}

/** How far from the best a plan may still be, never in cost points. */
export function boundInWords(outcome: { cost: { total: number }; bound: number }): string {
  const { total } = outcome.cost;
  const { bound } = outcome;
  if (bound >= total) return 'proven best';
  const share = total > 0 ? Math.ceil(((total - bound) / total) * 100) : 100;
  return share <= WORTH_SAYING ? `at most ${share} % better is possible` : 'not proven best';
}

/** The best plan of a search so far, in words. */
export function progressInWords(summary: PlanSummary): string {
  const { musts, waiting, changeovers } = summary;
  return `${musts.placed} of ${musts.all} musts, ${length(waiting.total)} waiting, ${length(changeovers)} changeovers`;
}

/** How much of a plan moved against the one before, in words. */
export function movedInWords(before: MadePlan, after: MadePlan): string {
  const place = ({ room, start }: PlanItem): string => `${room} ${start}`;
  const passes = (plan: MadePlan): PlanItem[] => plan.items.filter(({ kind }) => kind === 'pass');
  const was = new Map(passes(before).map((item) => [item.id, place(item)]));
  const moved = passes(after).filter((item) => was.has(item.id) && was.get(item.id) !== place(item)).length;
  return moved === 0 ? 'nothing moved' : `${moved} of ${was.size} passes moved`;
}
