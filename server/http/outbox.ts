import { Router } from 'express';
import { z } from 'zod';
import { outboxPage } from '../fakes/outbox-page.ts';

const mails = z.array(
  z.object({
    to: z.array(z.string()),
    from: z.string(),
    subject: z.string(),
    text: z.string(),
    html: z.string().nullable(),
    at: z.string(),
  }),
);

/** Shows on a machine of one's own what the fakes received. Never mounted where mail is real. */
export const outboxRouter = (outboxUrl: string): Router => {
  const router = Router();
  router.get('/outbox', (_req, res, next) => {
    fetch(new URL('/mails', outboxUrl))
      .then(async (answer) => mails.parse(await answer.json()))
      .then((list) => res.type('html').send(outboxPage(list)))
      .catch(next);
  });
  return router;
};
