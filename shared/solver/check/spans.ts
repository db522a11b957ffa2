import type { Minute, Minutes } from '../../domain/flavours';

/** A stretch of elapsed minutes, its end not included. */
export interface Span {
  from: Minute;
  to: Minute;
}

export const lengthOf = (span: Span): Minutes => span.to - span.from;
export const overlap = (one: Span, other: Span): boolean => one.from < other.to && other.from < one.to;

/** Stretches in order, those that touch or overlap made one. */
export function mergeSpans(spans: readonly Span[]): Span[] {
  const merged: Span[] = [];
  for (const { from, to } of [...spans].sort((one, other) => one.from - other.from)) {
    const last = merged.at(-1);
    if (last && from <= last.to) last.to = Math.max(last.to, to);
    else merged.push({ from, to });
  }
  return merged;
}

/** Whether one of the merged stretches holds the whole span. */
export function covers(merged: readonly Span[], span: Span): boolean {
  return merged.some((window) => window.from <= span.from && span.to <= window.to);
}

/** Minutes of the span that lie in the merged stretches. */
export function minutesWithin(merged: readonly Span[], span: Span): Minutes {
  return merged.reduce((sum, window) => sum + Math.max(0, Math.min(window.to, span.to) - Math.max(window.from, span.from)), 0);
}

/** Work that goes on for too long: since which minute, and the span that makes it too long. */
export interface LongRun<Work extends Span> {
  from: Minute;
  last: Work;
}

/**
 * The stretches of work that last more than `most` minutes from their first minute to their last without a gap of `pause` minutes, each
 * told once. A meal or a break in a room is such a gap, because nothing else may lie in it.
 * @param work spans by start
 * @param excuseOne whether one span alone may be longer
 */
export function longRuns<Work extends Span>(
  work: readonly Work[],
  limits: { most: Minutes; pause: Minutes; excuseOne: boolean },
): LongRun<Work>[] {
  const long: LongRun<Work>[] = [];
  let run: { from: Minute; to: Minute; count: number; told: boolean } | undefined;
  for (const span of work) {
    if (!run || span.from - run.to >= limits.pause) run = { from: span.from, to: span.to, count: 0, told: false };
    run.to = Math.max(run.to, span.to);
    run.count += 1;
    if (run.told || run.to - run.from <= limits.most || (limits.excuseOne && run.count === 1)) continue;
    run.told = true;
    long.push({ from: run.from, last: span });
  }
  return long;
}
