import type { Minutes } from '../domain/flavours';
import type { Span } from './model';

/** What two lists of stretches, each merged and in order, share. */
export function common(one: readonly Span[], other: readonly Span[]): Span[] {
  const shared: Span[] = [];
  for (const a of one)
    for (const b of other) {
      const from = Math.max(a.from, b.from);
      const to = Math.min(a.to, b.to);
      if (from < to) shared.push({ from, to });
    }
  return shared.sort((a, b) => a.from - b.from);
}

/** What is left of stretches without the busy ones, which are merged and in order. */
export function without(spans: readonly Span[], busy: readonly Span[]): Span[] {
  return spans.flatMap((span) => {
    const free: Span[] = [];
    let at = span.from;
    for (const { from, to } of busy) {
      if (to <= at || from >= span.to) continue;
      if (from > at) free.push({ from: at, to: from });
      at = Math.max(at, to);
    }
    if (at < span.to) free.push({ from: at, to: span.to });
    return free;
  });
}

export function total(spans: readonly Span[]): Minutes {
  return spans.reduce((sum, { from, to }) => sum + to - from, 0);
}
