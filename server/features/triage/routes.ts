import {
  claimFlag,
  closeFlag,
  getFlag,
  listFlags,
  releaseFlag,
  replyToFlag,
  seeFlag,
} from '#shared/triage/contract.ts';
import { route } from '../../http/route.ts';
import { caseFor, roundFor } from './round.ts';
import { claim, close, release, reply, see } from './work.ts';

export const triageRoutes = [
  route(listFlags, {
    access: { permission: 'flag:read' },
    audit: 'round.listed',
    handler: ({ tx, actor, now }) => roundFor(tx, actor, now),
  }),
  route(getFlag, {
    access: { permission: 'flag:read' },
    audit: 'case.opened',
    handler: ({ params, tx, actor, now }) => caseFor(tx, actor, params.flagId, now),
  }),
  route(seeFlag, {
    access: { permission: 'flag:work' },
    audit: 'flag.seen',
    handler: ({ params, tx, actor, now }) => see(tx, actor, params.flagId, now),
  }),
  route(claimFlag, {
    access: { permission: 'flag:work' },
    audit: 'flag.claimed',
    handler: ({ params, tx, actor, now }) => claim(tx, actor, params.flagId, now),
  }),
  route(releaseFlag, {
    access: { permission: 'flag:work' },
    audit: 'flag.released',
    handler: ({ params, tx, actor, now }) => release(tx, actor, params.flagId, now),
  }),
  route(closeFlag, {
    access: { permission: 'flag:work' },
    audit: 'flag.closed',
    handler: ({ params, body, tx, actor, now }) => close(tx, actor, { ...params, ...body }, now),
  }),
  route(replyToFlag, {
    access: { permission: 'flag:work' },
    audit: 'flag.replied',
    handler: ({ params, body, tx, actor, now }) => reply(tx, actor, { ...params, ...body }, now),
  }),
];
