import type { NewLink } from '../../shared/contracts/api';
import type { PublishedDemo } from '../support/demo';
import { milliseconds, percentile, seconds, timed, type Measure } from './table';

const FEED_READS = 300;
const WARM_PRINTS = 10;

export async function serverTimes({ client, id, plan }: PublishedDemo): Promise<Measure[]> {
  const first = plan.items.find((item) => item.kind === 'pass');
  const caller = plan.calls[0];
  if (!first?.room || !caller) throw new Error('The plan has no pass or no call to measure with.');
  const query = new URLSearchParams({ version: '1', date: first.start.slice(0, 10), room: first.room, paper: 'A4' });
  const print = async () => {
    const answer = await client.send('GET', `/api/productions/${id}/sheets/run-sheet.pdf?${query}`);
    const bytes = new Uint8Array(await answer.arrayBuffer());
    if (!answer.ok || !Buffer.from(bytes).toString('latin1').startsWith('%PDF-')) throw new Error(`no PDF: ${answer.status}`);
  };
  const cold = await timed(print);
  const warm: number[] = [];
  for (let run = 0; run < WARM_PRINTS; run++) warm.push(await timed(print));

  const link = await client.json<NewLink>('POST', `/api/productions/${id}/links`, { kind: 'calendar', person: caller.person });
  const feed = new URL(link.address, 'http://localhost').pathname;
  const etag = (await client.send('GET', feed)).headers.get('etag') ?? '';
  const read = async (status: number, headers: Record<string, string>) => {
    const answer = await client.send('GET', feed, undefined, headers);
    await answer.text();
    if (answer.status !== status) throw new Error(`the feed answered ${answer.status} instead of ${status}`);
  };
  const whole: number[] = [];
  const unchanged: number[] = [];
  for (let run = 0; run < FEED_READS; run++) {
    whole.push(await timed(() => read(200, {})));
    unchanged.push(await timed(() => read(304, { 'if-none-match': etag })));
  }
  return [
    { what: 'PDF of a day, the first after a start', result: seconds(cold), goal: '' },
    { what: `PDF of a day, warm (median of ${WARM_PRINTS})`, result: seconds(percentile(warm, 0.5)), goal: '≤ 1.5 s' },
    { what: `calendar feed, p95 of ${FEED_READS}`, result: milliseconds(percentile(whole, 0.95)), goal: '' },
    { what: `calendar feed unchanged (304), p95 of ${FEED_READS}`, result: milliseconds(percentile(unchanged, 0.95)), goal: '' },
  ];
}
