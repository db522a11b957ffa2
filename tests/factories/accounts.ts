import { randomUUID } from 'node:crypto';
import type { Express } from 'express';
import request from 'supertest';
import type { ProductionFile } from '../../shared/contracts/resources';
import type { Role } from '../../shared/contracts/roles';
import { writeProductionFile } from '../../shared/file/write';

export type Agent = ReturnType<typeof request.agent>;

export const PASSWORD = 'a long enough password';

/** Somebody with an account of their own, signed in. */
export async function someone(app: Express, name = 'Somebody'): Promise<{ agent: Agent; email: string }> {
  const agent = request.agent(app);
  const email = `${randomUUID()}@example.org`;
  await agent.post('/api/account').send({ email, name, password: PASSWORD }).expect(201);
  return { agent, email };
}

/** Somebody in a trial. */
export async function trialist(app: Express): Promise<Agent> {
  const agent = request.agent(app);
  await agent.post('/api/session/trial').expect(201);
  return agent;
}

/** A production from that file; answers its id. */
export async function productionOf(agent: Agent, file: ProductionFile): Promise<string> {
  const answer = await agent
    .post('/api/productions/import')
    .attach('file', Buffer.from(writeProductionFile(file)), 'production.yaml')
    .expect(201);
  return (answer.body as { id: string }).id;
}

/** Somebody new who is a member of a production in that role. */
export async function memberOf(app: Express, producer: Agent, production: string, role: Role, person?: string): Promise<Agent> {
  const { agent, email } = await someone(app, `A ${role}`);
  await producer
    .post(`/api/productions/${production}/members`)
    .send({ email, role, ...(person ? { person } : {}) })
    .expect(201);
  return agent;
}
