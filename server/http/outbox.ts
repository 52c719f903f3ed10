import { Router, type RequestHandler, type Response } from 'express';
import { TOTP } from 'otpauth';
import { z } from 'zod';
import { Problem } from '#shared/problems/problems.ts';
import { outboxPage } from '../fakes/outbox-page.ts';
import { sentKinds, type Sent } from '../fakes/sent.ts';

type OutboxOptions = {
  /** Where the fakes answer. */
  fakesUrl: string;
  /** The origin of our own pages: no other page may press a key here. */
  publicOrigin: string;
  /** The authenticator apps of the demo's staff, so that a visitor can sign in as one of them. */
  authenticators: readonly { name: string; secret: string }[];
  clock: () => Date;
};

const kindAsked = z.object({ kind: z.enum(sentKinds) });
const callSid = /^CA[0-9a-f]{32}$/;

/** Shows on a machine of one's own what the fakes received. Never mounted where gateways are real. */
export const outboxRouter = ({ fakesUrl, publicOrigin, authenticators, clock }: OutboxOptions): Router => {
  const router = Router();

  const fromOwnPage: RequestHandler = (req, _res, next) => {
    next(req.headers.origin === publicOrigin ? undefined : new Problem('foreign-request'));
  };

  const atFakes = (path: string, body?: unknown): Promise<globalThis.Response> =>
    fetch(new URL(path, fakesUrl), { method: 'POST', ...(body ? { body: JSON.stringify(body) } : {}) });

  const codes = () => {
    const timestamp = clock().getTime();
    return authenticators.map(({ name, secret }) => {
      const totp = new TOTP({ secret });
      return {
        name,
        code: totp.generate({ timestamp }),
        leftS: Math.ceil(totp.remaining({ timestamp }) / 1000),
      };
    });
  };

  router.get('/outbox', async (req, res) => {
    const answer = await fetch(new URL('/sent', fakesUrl));
    const sent = (await answer.json()) as Sent[];
    const kind = kindAsked.safeParse(req.query).data?.kind ?? null;
    res.setHeader('cache-control', 'no-store');
    // Without it a form of the page would not say where it comes from.
    res.setHeader('referrer-policy', 'same-origin');
    res.type('html').send(outboxPage({ sent, kind, codes: codes() }));
  });

  /** A call that ended meanwhile is as good as one that ends now: the page shows how it is. */
  const act = async (sid: unknown, res: Response, path: string, body?: unknown) => {
    if (typeof sid !== 'string' || !callSid.test(sid)) throw new Problem('not-found');
    const answer = await atFakes(`/calls/${sid}/${path}`, body);
    if (!answer.ok && answer.status !== 404) throw new Problem('unavailable');
    res.redirect(303, '/outbox?kind=call');
  };
  router.post('/outbox/calls/:sid/press', fromOwnPage, (req, res) =>
    act(req.params.sid, res, 'keys', { digit: '1' }),
  );
  router.post('/outbox/calls/:sid/ring-out', fromOwnPage, (req, res) => act(req.params.sid, res, 'ring-out'));

  /** What a browser that cannot reach its maker's push service is given instead. */
  router.post('/outbox/push-devices', fromOwnPage, async (_req, res) => {
    const answer = await atFakes('/push-devices');
    res.status(answer.status).json(await answer.json());
  });
  return router;
};
