import { lookup, type LookupAddress } from 'node:dns';
import { request as requestHttp } from 'node:http';
import { request as requestHttps } from 'node:https';
import type { LookupFunction } from 'node:net';
import { isPublicAddress } from './push-endpoint.ts';

const timeoutMs = 10_000;

/** The name leads into a private network: calling it would let a browser reach what only this server can. */
export class PrivateAddress extends Error {}

/** A resolver that knows public addresses only. */
export const publicLookup: LookupFunction = (hostname, options, done) => {
  lookup(hostname, { ...options, all: true }, (error, addresses: LookupAddress[]) => {
    const [first] = addresses ?? [];
    if (error) done(error, []);
    else if (!first || !addresses.every(({ address }) => isPublicAddress(address))) {
      done(new PrivateAddress('The name leads to an address that is not public.'), []);
    } else if (options.all) done(null, addresses);
    else done(null, first.address, first.family);
  });
};

/**
 * Posts to a push service and gives the status of its answer. The address that was judged is the one that is
 * called, so a name that changes its mind in between gains nothing; a redirect is a status like any other.
 */
export const postPush = (
  url: string,
  { headers, body }: { headers: Record<string, string | number>; body: Buffer },
  resolve?: LookupFunction,
): Promise<number> =>
  new Promise((done, fail) => {
    const request = url.startsWith('https:') ? requestHttps : requestHttp;
    const options = {
      method: 'POST',
      headers,
      signal: AbortSignal.timeout(timeoutMs),
      // No connection is kept: a kept one would be used without judging its address.
      agent: false,
      ...(resolve ? { lookup: resolve } : {}),
    };
    const sent = request(url, options, (answer) => {
      answer.resume();
      done(answer.statusCode ?? 0);
    });
    sent.on('error', fail);
    sent.end(body);
  });
