import { json, Router, type Request, type RequestHandler, type Response } from 'express';
import type { z } from 'zod';
import { may, type Action } from '../../shared/domain/policy';
import type { Context } from '../context';
import type { Actor, Membership } from './actor';
import { demandActor } from './authenticate';
import { Refusal } from './errors';
import { membershipOf } from './membership';
import { validate } from './validate';

type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

/** What a route's work is given: everything checked. */
export interface Given<Body, Query> {
  body: Body;
  query: Query;
  params: Record<string, string>;
  request: Request;
  response: Response;
}
export type ForActor<Body, Query> = Given<Body, Query> & { actor: Actor };
export type ForMember<Body, Query> = ForActor<Body, Query> & { member: Membership };

interface Spec<Body, Query, Answer, What> {
  body?: z.ZodType<Body>;
  /** How large the body may be, such as `4mb`; 100 kB unless given. */
  bodyLimit?: string;
  query?: z.ZodType<Query>;
  /** Limits and uploads: after the actor is known, before anything is checked. */
  before?: RequestHandler[];
  /** Status of a good answer; 200 unless given, 204 where there is no answer. */
  status?: number;
  run: (given: What) => Promise<Answer>;
  /** Sends an answer that is no JSON. */
  send?: (response: Response, answer: Answer) => void;
}

/**
 * The three ways to open an address, and there is no fourth: for anyone, for somebody signed in, for a member who may do the named
 * action. Paths are written out in full, so that the list of routes can be read from the app itself.
 */
export interface Routes {
  router: Router;
  anyone: <Answer, Body = undefined, Query = undefined>(
    method: Method,
    path: string,
    spec: Spec<Body, Query, Answer, Given<Body, Query>>,
  ) => void;
  account: <Answer, Body = undefined, Query = undefined>(
    method: Method,
    path: string,
    spec: Spec<Body, Query, Answer, ForActor<Body, Query>>,
  ) => void;
  /** `path` holds `:production`. Another's production is not there (404); a member who may not is told so (403). */
  member: <Answer, Body = undefined, Query = undefined>(
    method: Method,
    path: `/${string}/:production${string}`,
    action: Action,
    spec: Spec<Body, Query, Answer, ForMember<Body, Query>>,
  ) => void;
}

/** Lets a piece of middleware do its work, and goes on when it calls on or fails when it fails. */
const pass = (handler: RequestHandler, request: Request, response: Response) =>
  new Promise<void>((resolve, reject) => {
    void handler(request, response, (error?: unknown) => (error === undefined ? resolve() : reject(error)));
  });

const paramsOf = (request: Request): Record<string, string> =>
  Object.fromEntries(Object.entries(request.params).map(([name, value]) => [name, String(value)]));

export function createRoutes(context: Context): Routes {
  const router = Router();

  function add<Body, Query, Answer, What extends Given<Body, Query>>(
    method: Method,
    path: string,
    spec: Spec<Body, Query, Answer, What>,
    admit: (request: Request, params: Record<string, string>) => Promise<Omit<What, keyof Given<Body, Query>>>,
  ): void {
    const before = [...(spec.body ? [json({ limit: spec.bodyLimit ?? '100kb' })] : []), ...(spec.before ?? [])];
    router[method](path, async (request: Request, response: Response) => {
      const params = paramsOf(request);
      const admitted = await admit(request, params);
      for (const handler of before) await pass(handler, request, response);
      const given = {
        ...admitted,
        body: (spec.body ? validate(spec.body, request.body, 'The request') : undefined) as Body,
        query: (spec.query ? validate(spec.query, request.query, 'The address') : undefined) as Query,
        params,
        request,
        response,
      } as What;
      const answer = await spec.run(given);
      if (answer === undefined) response.status(spec.status ?? 204).end();
      else if (spec.send) spec.send(response, answer);
      else response.status(spec.status ?? 200).json(answer);
    });
  }

  return {
    router,
    anyone: (method, path, spec) => add(method, path, spec, async () => ({})),
    account: (method, path, spec) => add(method, path, spec, async (request) => ({ actor: await demandActor(context, request) })),
    member: (method, path, action, spec) =>
      add(method, path, spec, async (request, params) => {
        const actor = await demandActor(context, request);
        const member = await membershipOf(context, actor, params.production);
        if (!may(member.role, action))
          throw new Refusal('not-allowed', `As ${member.role} you may not do this in the production. Ask its producer.`);
        return { actor, member };
      }),
  };
}
