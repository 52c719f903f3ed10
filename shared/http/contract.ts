import type { z } from 'zod';

export type Method = 'get' | 'post' | 'put' | 'delete';

/** A route as both sides know it. What only the server knows is added beside the handler. */
export type Contract<
  M extends Method = Method,
  P extends string = string,
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Output extends z.ZodType = z.ZodType,
> = {
  method: M;
  path: P;
  /** One plain sentence for the API document. */
  summary: string;
  /** The status of success. */
  status: 200 | 201 | 204;
  params?: Params;
  query?: Query;
  body?: Body;
  output?: Output;
};

export const contract = <
  const M extends Method,
  const P extends `/api/${string}`,
  Params extends z.ZodType = z.ZodNever,
  Query extends z.ZodType = z.ZodNever,
  Body extends z.ZodType = z.ZodNever,
  Output extends z.ZodType = z.ZodVoid,
>(
  definition: Contract<M, P, Params, Query, Body, Output>,
): Contract<M, P, Params, Query, Body, Output> => definition;

type Known<Key extends string, T extends z.ZodType> = T extends z.ZodNever
  ? unknown
  : { [K in Key]: z.output<T> };

/** What a handler receives: only the parts that the contract declares. */
export type InputOf<C> =
  C extends Contract<Method, string, infer P, infer Q, infer B>
    ? Known<'params', P> & Known<'query', Q> & Known<'body', B>
    : never;

type Sent<Key extends string, T extends z.ZodType> = T extends z.ZodNever
  ? unknown
  : { [K in Key]: z.input<T> };

/** What a caller sends: the same parts before they are parsed. */
export type RequestOf<C> =
  C extends Contract<Method, string, infer P, infer Q, infer B>
    ? Sent<'params', P> & Sent<'query', Q> & Sent<'body', B>
    : never;

export type OutputOf<C> =
  C extends Contract<Method, string, z.ZodType, z.ZodType, z.ZodType, infer O> ? z.output<O> : never;
