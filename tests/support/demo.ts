import type { Draft, Snapshot } from '../../shared/contracts/api';
import type { ProductionFile } from '../../shared/contracts/resources';
import type { MadePlan } from '../../shared/contracts/plan';
import { readProductionFile } from '../../shared/file/read';
import { planProduction } from '../../shared/planner/plan';
import { Client } from './client';

export interface PublishedDemo {
  client: Client;
  id: string;
  file: ProductionFile;
  plan: MadePlan;
}

/** The production as its export gives it. */
export async function exported(client: Client, id: string): Promise<ProductionFile> {
  const answer = await client.send('GET', `/api/productions/${id}/file.yaml`);
  const read = readProductionFile(await answer.text());
  if (!read.ok) throw new Error(`The export has faults: ${JSON.stringify(read.faults)}`);
  return read.file;
}

interface DemoOptions {
  /** Work on the production before it is planned. */
  before?: (client: Client, id: string) => Promise<void>;
  /** How long to look for a plan: timetables to try. */
  iterations?: number;
}

/** Opens a trial with the demo, plans it with a fixed seed and publishes the plan, all through the API. */
export async function publishDemo(address: string, { before, iterations = 1000 }: DemoOptions = {}): Promise<PublishedDemo> {
  const client = new Client(address);
  const id = await client.openTrial();
  await before?.(client, id);
  const { revision } = await client.json<Snapshot>('GET', `/api/productions/${id}`);
  const file = await exported(client, id);
  const work = { seed: 1, iterations };
  const outcome = planProduction(file, { ...work, stop: () => false });
  await new Promise((resolve) => setTimeout(resolve, 10)); // connections that the server closed while we planned are noticed
  if (outcome.cost === null) throw new Error(`The demo has no plan: ${outcome.status}`);
  const plan = await client.json<Draft>('POST', `/api/productions/${id}/plans`, { inputRevision: revision, ...work, outcome });
  await client.json('POST', `/api/productions/${id}/versions`, { plan: plan.id });
  return { client, id, file, plan: outcome };
}
