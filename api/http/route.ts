/**
 * One declaration a route: it registers the handler, checks what comes in and what goes out, makes the
 * entry of the API description, and says who may. A feature exports `routes: RouteDefinition[]`.
 */
import type { Request, Response } from 'express';
import type { DataSource } from 'typeorm';
import type { z } from 'zod';
import type { Actor } from '../audit/actor.ts';
import type { StudyRole } from '../contracts/common.ts';
import type { AppDeps } from './deps.ts';
import type { StudyMembership } from './membership.ts';
import type { SignedInPerson } from './request-facts.ts';

/** `{ study: [...] }` needs `:study` in the path, and one of these duties in that study. */
export type Access =
  | 'public'
  | 'signed in'
  | 'administrator'
  | { readonly study: readonly StudyRole[] };

type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

type PathNames<Path extends string> = Path extends `${string}/:${infer Rest}`
  ? Rest extends `${infer Name}/${infer Tail}`
    ? Name | PathNames<`/${Tail}`>
    : Rest
  : never;

/** What every handler gets. Ids in `params` are opaque and have the form of one; `:study` is resolved already. */
interface BaseContext<Path extends string, Query, Body> {
  params: Record<PathNames<Path>, string>;
  query: Query;
  body: Body;
  deps: AppDeps;
  requestId: string;
  /** For what the checked parts don't hold, such as a stream of a file or a header. */
  req: Request;
  res: Response;
}

interface SignedInContext {
  person: SignedInPerson;
  /** For `inTransaction`; its role is the one that allowed this act. */
  actor: Actor;
  /** The database of the person's role: masked, board or open. Nothing else may be used for study data. */
  db: DataSource;
}

interface StudyContext extends SignedInContext {
  membership: StudyMembership;
}

export type RouteContext<Path extends string, Who extends Access, Query, Body> = BaseContext<
  Path,
  Query,
  Body
> &
  (Who extends 'public'
    ? unknown
    : Who extends { study: unknown }
      ? StudyContext
      : SignedInContext);

interface Declaration<Path extends string, Who extends Access, Query, Body> {
  method: Method;
  /** Express form, `/api/studies/:study/members`. Every `:name` is an opaque id. */
  path: Path;
  /** One sentence for the API description. */
  summary: string;
  access: Who;
  query?: z.ZodType<Query>;
  /** JSON body. */
  body?: z.ZodType<Body>;
  /** Text fields beside the file of a multipart upload; the handler reads the stream itself. */
  form?: z.ZodType;
  /** Takes an `Idempotency-Key`: the same act asked again gets the first answer. */
  idempotent?: boolean;
  /** Closed or sealed content: no replay keeps a body of it. */
  sealed?: boolean;
  /** Asked by the page by itself, so no sign of a person at work. */
  background?: boolean;
  /** Open while a temporary password waits to be changed. */
  withTemporaryPassword?: boolean;
}

interface JsonDeclaration<Path extends string, Who extends Access, Query, Body, Answer>
  extends Declaration<Path, Who, Query, Body> {
  /** 200 unless said otherwise; 204 where there is no answer. */
  status?: 200 | 201 | 202;
  /** Null: nothing is answered. What the contract does not name never leaves. */
  answer: z.ZodType<unknown, Answer> | null;
  handler: (context: RouteContext<Path, Who, Query, Body>) => Promise<Answer>;
}

interface FileDeclaration<Path extends string, Who extends Access, Query, Body>
  extends Declaration<Path, Who, Query, Body> {
  /** Media type, such as `text/csv` or `text/event-stream`. */
  produces: string;
  /** Writes the answer itself; see `sendFile`. */
  handler: (context: RouteContext<Path, Who, Query, Body>) => Promise<void>;
}

/** A declared route as the application keeps it. */
export interface RouteDefinition {
  readonly method: Method;
  readonly path: string;
  readonly summary: string;
  readonly access: Access;
  readonly query?: z.ZodType;
  readonly body?: z.ZodType;
  readonly form?: z.ZodType;
  readonly idempotent: boolean;
  readonly sealed: boolean;
  readonly background: boolean;
  readonly withTemporaryPassword: boolean;
  readonly status: number;
  readonly answer: z.ZodType | null;
  /** Set for routes that write their answer themselves. */
  readonly produces?: string;
  readonly handler: (context: AnyContext) => Promise<unknown>;
}

/** A context whose parts are checked against the declaration before the handler gets it. */
export type AnyContext = BaseContext<string, unknown, unknown> & Partial<StudyContext>;

const common = <Path extends string, Who extends Access, Query, Body>(
  route: Declaration<Path, Who, Query, Body>,
) => {
  if (typeof route.access === 'object' && !`${route.path}/`.includes('/:study/')) {
    throw new Error(`${route.path} asks for duties in a study, but its path names none`);
  }
  return {
    idempotent: route.idempotent ?? false,
    sealed: route.sealed ?? false,
    background: route.background ?? false,
    withTemporaryPassword: route.withTemporaryPassword ?? false,
  };
};

/** A route that answers JSON. */
export function defineRoute<
  const Path extends string,
  const Who extends Access,
  Answer,
  Query = undefined,
  Body = undefined,
>(route: JsonDeclaration<Path, Who, Query, Body, Answer>): RouteDefinition {
  const status = route.answer === null ? 204 : (route.status ?? 200);
  // The checks of serve-route.ts make exactly the context that the declaration promises.
  const handler = route.handler as unknown as RouteDefinition['handler'];
  return { ...route, ...common(route), status, handler };
}

/** A route that answers a file or a stream. */
export function defineFileRoute<
  const Path extends string,
  const Who extends Access,
  Query = undefined,
  Body = undefined,
>(route: FileDeclaration<Path, Who, Query, Body>): RouteDefinition {
  const handler = route.handler as unknown as RouteDefinition['handler'];
  return { ...route, ...common(route), status: 200, answer: null, handler };
}
