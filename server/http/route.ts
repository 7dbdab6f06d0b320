/**
 * A slice's routes are a table: verb, path, access, contract, handler. The same table mounts the
 * handlers and writes /api/openapi.json, so the description cannot fall behind.
 */
import type { Readable } from 'node:stream';
import type { Request, Response } from 'express';
import type { z } from 'zod';
import type { ErrorCode } from '../../shared/contracts/errors.ts';
import type { Parts } from '../parts.ts';
import type { Actor } from './actor.ts';

export type Verb = 'get' | 'post' | 'patch' | 'put' | 'delete';
/** A body that is bytes and no JSON. Read only after the person is known. */
export interface ByteBody {
  mediaTypes: readonly string[];
  largestBytes: number;
  /** Refusal of a larger one. */
  tooLarge: ErrorCode;
}

/** An answer that is bytes and no JSON; with a file name the browser saves it instead of showing it. */
export interface ByteAnswer {
  mediaType: string;
  /** A stream for what may be long. */
  bytes: Buffer | string | Readable;
  fileName?: string;
}

type Infer<S> = S extends z.ZodType ? z.output<S> : undefined;

export interface Call<Access, Params, Query, Body> {
  parts: Parts;
  actor: Access extends 'session' ? Actor : Actor | null;
  params: Infer<Params>;
  query: Infer<Query>;
  body: Infer<Body>;
  request: Request;
  response: Response;
}

export interface RouteSpec<
  Access extends 'session' | 'public' = 'session' | 'public',
  Params extends z.ZodType | undefined = z.ZodType | undefined,
  Query extends z.ZodType | undefined = z.ZodType | undefined,
  Body extends z.ZodType | undefined = z.ZodType | undefined,
  Answer extends z.ZodType | undefined = z.ZodType | undefined,
> {
  verb: Verb;
  /** Express path under the server root, for instance `/api/probes/:id`. */
  path: string;
  access: Access;
  /** One sentence for the description: what the person does. */
  does: string;
  params?: Params;
  query?: Query;
  body?: Body;
  /** Takes bytes instead of JSON: they are `request.body`, a Buffer. */
  bytes?: ByteBody;
  /** Contract of the answer; left out = 204 without a body. */
  answer?: Answer;
  /** Answers bytes of these types instead of JSON: `run` gives a ByteAnswer. */
  sends?: readonly string[];
  /** 200 unless told; 201 for a creation. */
  status?: number;
  run: (
    call: Call<Access, Params, Query, Body>,
  ) => Promise<Answer extends z.ZodType ? z.input<Answer> : ByteAnswer | void>;
}

/** A route whose types have been checked and may stand in a table with others. */
export type AnyRoute = Omit<RouteSpec, 'run'> & { run: (call: never) => Promise<unknown> };

/** Types one route from its contracts. */
export const route = <
  Access extends 'session' | 'public',
  Params extends z.ZodType | undefined = undefined,
  Query extends z.ZodType | undefined = undefined,
  Body extends z.ZodType | undefined = undefined,
  Answer extends z.ZodType | undefined = undefined,
>(
  spec: RouteSpec<Access, Params, Query, Body, Answer>,
): AnyRoute => spec as unknown as AnyRoute;
