/** One line of the printed table. */
export interface Measure {
  what: string;
  result: string;
  goal: string;
}

export const seconds = (milliseconds: number) => `${(milliseconds / 1000).toFixed(2)} s`;
export const milliseconds = (value: number) => `${value.toFixed(1)} ms`;
export const kilobytes = (bytes: number) => `${(bytes / 1000).toFixed(0)} kB`;

/** Milliseconds that some work took. */
export async function timed(work: () => Promise<unknown>): Promise<number> {
  const began = performance.now();
  await work();
  return performance.now() - began;
}

/** The value that a share of the measured ones does not exceed (nearest rank). */
export function percentile(values: number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.max(0, Math.ceil(sorted.length * share) - 1)] ?? Number.NaN;
}

export const median = (values: number[]) => percentile(values, 0.5);

export function printTable(measures: Measure[]): void {
  const head: Measure = { what: 'Measure', result: 'Result', goal: 'Goal' };
  const width = (field: keyof Measure) => Math.max(...[head, ...measures].map((measure) => measure[field].length));
  const line = (measure: Measure) =>
    `| ${measure.what.padEnd(width('what'))} | ${measure.result.padEnd(width('result'))} | ${measure.goal.padEnd(width('goal'))} |`;
  console.log([line(head), line(head).replace(/[^|]/g, '-'), ...measures.map(line)].join('\n'));
}
