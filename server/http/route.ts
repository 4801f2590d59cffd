import express, { type Request, type RequestHandler, type Response, type Router } from 'express';
import type { z } from 'zod';
import { idSchema, type Role } from '../../shared/contracts';
import { isStorableText } from '../db/text';
import type { Dependencies } from '../dependencies';
import { findCaller, sessionExpired, type Caller } from './caller';
import { HttpProblem, invalid, invalidFields, notFound } from './problem';

/** Who may call a route: anyone at all, any signed-in account, or accounts with one of the roles. */
export type Who = 'public' | 'any' | readonly Role[];

type Parsed<S> = S extends z.ZodType ? z.output<S> : undefined;

/** One request, checked: what its route's handler gets. */
export interface Call<W extends Who, B, Q> {
  readonly caller: W extends 'public' ? null : Caller;
  /** The role in which the caller acts here: the first of the route's roles that they hold. */
  readonly role: Role | null;
  readonly body: Parsed<B>;
  readonly query: Parsed<Q>;
  /** The path's `:id`. Known to be a UUID; empty where the path has none. */
  readonly id: string;
  readonly request: Request;
  readonly response: Response;
}

export interface RouteDefinition<
  W extends Who,
  B extends z.ZodType | undefined,
  Q extends z.ZodType | undefined,
  A extends z.ZodType | 'nothing' | 'stream',
> {
  readonly method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  readonly path: `/api/${string}`;
  readonly who: W;
  readonly body?: B;
  readonly query?: Q;
  /** Contract of the answer; `nothing` answers 204; with `stream` the handler writes the response itself. */
  readonly answer: A;
  /** Run after the body is read and before it is judged: limits, upload readers. */
  readonly before?: readonly RequestHandler[];
  readonly handle: (call: Call<W, B, Q>) => Promise<A extends z.ZodType ? z.input<A> : void>;
}

/** A route with its types forgotten, as the table holds it. */
export interface Route {
  readonly method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  readonly path: string;
  readonly who: Who;
  readonly body: z.ZodType | undefined;
  readonly query: z.ZodType | undefined;
  readonly answer: z.ZodType | 'nothing' | 'stream';
  readonly before: readonly RequestHandler[];
  readonly handle: (call: Call<Who, z.ZodType, z.ZodType>) => Promise<unknown>;
}

/** States one route. There is no other way to add one, and none can leave out who may call it. */
export function route<
  const W extends Who,
  A extends z.ZodType | 'nothing' | 'stream',
  B extends z.ZodType | undefined = undefined,
  Q extends z.ZodType | undefined = undefined,
>(definition: RouteDefinition<W, B, Q, A>): Route {
  return {
    method: definition.method,
    path: definition.path,
    who: definition.who,
    body: definition.body,
    query: definition.query,
    answer: definition.answer,
    before: definition.before ?? [],
    // The table below fills in the parsed body and query by the same schemas, so the types hold.
    handle: definition.handle as unknown as Route['handle'],
  };
}

function parse(schema: z.ZodType | undefined, value: unknown): unknown {
  if (!schema) return undefined;
  const parsed = schema.safeParse(value);
  if (!parsed.success) throw invalid(parsed.error);
  if (!isStorableText(parsed.data))
    throw invalidFields([{ path: '', message: 'A text holds a character that can’t be stored. Retype it.' }]);
  return parsed.data;
}

/** What authorisation found, kept beside the request until the handler runs. */
const admitted = new WeakMap<Request, { caller: Caller | null; role: Role | null }>();

function admit(who: Who, dependencies: Dependencies): RequestHandler {
  return async (request, _response, next) => {
    if (who === 'public') {
      admitted.set(request, { caller: null, role: null });
      next();
      return;
    }
    const caller = await findCaller(request, dependencies);
    if (!caller) throw sessionExpired();
    const role = who === 'any' ? null : (who.find((one) => caller.roles.includes(one)) ?? null);
    if (who !== 'any' && !role)
      throw new HttpProblem(403, 'not-allowed', `This is for the ${who.join(' or the ')} of the team.`);
    admitted.set(request, { caller, role });
    next();
  };
}

function answer(stated: Route, dependencies: Dependencies): RequestHandler {
  return async (request, response) => {
    const who = admitted.get(request);
    if (!who) throw new Error('A handler ran before authorisation.');
    const id = request.params['id'];
    const result = await stated.handle({
      caller: who.caller,
      role: who.role,
      body: parse(stated.body, request.body),
      query: parse(stated.query, request.query),
      id: typeof id === 'string' ? id : '',
      request,
      response,
    });
    if (stated.answer === 'stream') return;
    dependencies.post.kick();
    if (stated.answer === 'nothing') response.status(204).end();
    // Nothing leaves that its contract does not name.
    else response.json(stated.answer.parse(result));
  };
}

/** Mounts routes on a router in the order of their checks: who, the path's id, the body, the contract, the act. */
export function mount(router: Router, routes: readonly Route[], dependencies: Dependencies): void {
  const json = express.json({ limit: '1mb' });
  for (const stated of routes) {
    const checkId: RequestHandler = (request, _response, next) => {
      if (stated.path.includes(':id') && !idSchema.safeParse(request.params['id']).success)
        throw notFound('thing');
      next();
    };
    router[stated.method](
      stated.path.replace(/^\/api/, ''),
      admit(stated.who, dependencies),
      checkId,
      json,
      ...stated.before,
      answer(stated, dependencies),
    );
  }
}
