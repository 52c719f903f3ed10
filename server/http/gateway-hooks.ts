import { createHash, timingSafeEqual } from 'node:crypto';
import express, { Router, type Request, type RequestHandler } from 'express';
import twilio from 'twilio';
import { z } from 'zod';
import type { Pools } from '../db/pools.ts';
import { withTx, type Tx } from '../db/with-tx.ts';
import { noteBounce } from '../notifications/bounces.ts';
import { noteGatewayStatus, noteKeyPress } from '../notifications/calls.ts';
import { keyPressSentence, thankYouSentence } from '../notifications/telephone-wording.ts';

export type HookTokens = {
  /** With it the telephone gateway signs what it sends; without it there are no hooks for it. */
  telephone?: string | undefined;
  /** The bearer token of whoever hands in mails that came back; without it there is no such hook. */
  mailBounces?: string | undefined;
};

type HookOptions = { pools: Pools; clock: () => Date; publicUrl: string; tokens: HookTokens };

const formLimit = '16kb';
const bounceLimit = '256kb';

const ids = z.object({ clinicId: z.uuid(), notificationId: z.uuid() });
const form = z.record(z.string(), z.union([z.string(), z.array(z.string())])).catch({});

/** The gateway signs the public address and every parameter (HMAC-SHA1); whatever is not signed is not read. */
const signedByGateway =
  (token: string, publicUrl: string): RequestHandler =>
  (req, res, next) => {
    const signature = req.get('x-twilio-signature') ?? '';
    const url = new URL(req.originalUrl, publicUrl).href;
    if (twilio.validateRequest(token, signature, url, form.parse(req.body))) next();
    else res.sendStatus(403);
  };

const digest = (text: string) => createHash('sha256').update(text).digest();

const bearer =
  (token: string): RequestHandler =>
  (req, res, next) => {
    if (timingSafeEqual(digest(req.get('authorization') ?? ''), digest(`Bearer ${token}`))) next();
    else res.sendStatus(403);
  };

const fieldOf = (req: Request, name: string): string => {
  const value = form.parse(req.body)[name];
  return typeof value === 'string' ? value : '';
};

/** What is said next: thanks for the right key, the request once more for any other. Never whether the id is known. */
const answerToKey = (digit: string, ownUrl: string): string => {
  const spoken = new twilio.twiml.VoiceResponse();
  if (digit === '1') spoken.say(thankYouSentence);
  else spoken.gather({ input: ['dtmf'], numDigits: 1, action: ownUrl, method: 'POST' }).say(keyPressSentence);
  spoken.hangup();
  return spoken.toString();
};

const telephoneHooks = ({ pools, clock, publicUrl }: HookOptions, token: string): Router => {
  const router = Router();
  const signed = [
    express.urlencoded({ extended: false, limit: formLimit }),
    signedByGateway(token, publicUrl),
  ];

  /** Runs for the row that the address names; an address that names none is answered like any other. */
  const inClinic = async (req: Request, run: (tx: Tx, named: z.output<typeof ids>) => Promise<void>) => {
    const named = ids.safeParse(req.params);
    if (!named.success) return;
    const actor = { kind: 'system', clinicId: named.data.clinicId } as const;
    await withTx(pools.app, actor, (tx) => run(tx, named.data));
  };

  router.post(
    '/gateway/calls/:clinicId/:notificationId/keys',
    signed,
    async (req: Request, res: express.Response) => {
      const digit = fieldOf(req, 'Digits');
      if (digit === '1') await inClinic(req, (tx, named) => noteKeyPress(tx, named, clock()));
      res.type('text/xml').send(answerToKey(digit, new URL(req.originalUrl, publicUrl).href));
    },
  );

  for (const [path, field, sidField] of [
    ['/gateway/calls/:clinicId/:notificationId/status', 'CallStatus', 'CallSid'],
    ['/gateway/messages/:clinicId/:notificationId/status', 'MessageStatus', 'MessageSid'],
  ] as const) {
    router.post(path, signed, async (req: Request, res: express.Response) => {
      const news = { sid: fieldOf(req, sidField), status: fieldOf(req, field) };
      await inClinic(req, (tx, named) => noteGatewayStatus(tx, named, news, clock()));
      res.sendStatus(204);
    });
  }
  return router;
};

const bounceHook = ({ pools, clock }: HookOptions, token: string): Router => {
  const router = Router();
  const body = express.text({ type: ['message/rfc822', 'text/plain'], limit: bounceLimit });
  router.post('/gateway/mail-bounces', bearer(token), body, async (req: Request, res: express.Response) => {
    if (typeof req.body !== 'string') {
      res.sendStatus(415);
      return;
    }
    await noteBounce(pools.app, req.body, clock());
    res.sendStatus(204);
  });
  return router;
};

/** Where the gateways tell what became of calls, messages and mails. Outside the API: no session, no page of ours. */
export const gatewayHooks = (options: HookOptions): Router => {
  const router = Router();
  const { telephone, mailBounces } = options.tokens;
  if (telephone) router.use(telephoneHooks(options, telephone));
  if (mailBounces) router.use(bounceHook(options, mailBounces));
  return router;
};
