import type { NecessaryCondition } from './condition';
import type { Statement } from './statement';
import { viewOf } from './view';

/** Facts are tried in this order, so that what stays is what a producer can talk about: people and passes rather than rules. */
const ORDER = ['rules', 'rooms', 'gear', 'people', 'events', 'passes'];
const rankOf = (fact: string) => ORDER.indexOf(fact.slice(0, fact.indexOf('.')));

export interface Narrowed {
  /** With any one of them dropped, the condition no longer fails. */
  facts: string[];
  dropped: ReadonlySet<string>;
}

/**
 * A minimal set of facts for which a condition still fails. Facts are dropped in halves, quarters and so on down to one by one; those that
 * are not asked for any more go at once, and those that are asked for only now join in.
 * @param settled facts that are out of the question from the start
 */
export function narrow(statement: Statement, condition: NecessaryCondition, subject: string, settled: ReadonlySet<string>): Narrowed {
  const dropped = new Set(settled);
  const askedWithout = (more: readonly string[]): string[] | null => {
    const view = viewOf(statement, new Set([...dropped, ...more]));
    return condition.fails(view, subject) === null ? null : [...view.asked].sort(byRank);
  };
  let facts = askedWithout([]) ?? [];
  for (let size = Math.ceil(facts.length / 2); size >= 1; size = size === 1 ? 0 : Math.ceil(size / 2)) {
    for (let at = 0; at < facts.length;) {
      const chunk = facts.slice(at, at + size);
      const asked = askedWithout(chunk);
      if (!asked) {
        at += chunk.length;
        continue;
      }
      for (const fact of chunk) dropped.add(fact);
      const tried = facts.slice(0, at).filter((fact) => asked.includes(fact));
      facts = [...tried, ...asked.filter((fact) => !tried.includes(fact))];
      at = tried.length;
    }
  }
  return { facts, dropped };
}

const byRank = (one: string, other: string): number => rankOf(one) - rankOf(other) || (one < other ? -1 : 1);
