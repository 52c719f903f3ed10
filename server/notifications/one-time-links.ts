import type pg from 'pg';
import { linkTokenOf, tokenById } from '../features/accounts/one-time-tokens.ts';
import type { Outgoing } from './channels.ts';

const linkKinds = ['invitation', 'password-reset', 'email-change'] as const;
type LinkKind = (typeof linkKinds)[number];

const isLinkKind = (kind: string): kind is LinkKind => (linkKinds as readonly string[]).includes(kind);

/**
 * Puts the secret of a one-time link behind its id, which is all that is kept of it, at the moment of sending. A
 * change of address is confirmed at the new one. Null for a link that opens nothing any more: it is not sent.
 */
export const withLinkSecret = async (
  { gate, tokenSecret }: { gate: pg.Pool; tokenSecret: string },
  outgoing: Outgoing,
  now: Date,
): Promise<Outgoing | null> => {
  if (!isLinkKind(outgoing.kind)) return outgoing;
  const [page = '', id = ''] = outgoing.path.split('#');
  const token = await tokenById(gate, id);
  const opens = token?.kind === outgoing.kind && !token.usedAt && !token.revokedAt && token.expiresAt > now;
  if (!token || !opens) return null;
  if (token.clinicId !== outgoing.clinicId) return null;
  return {
    ...outgoing,
    path: `${page}#${linkTokenOf(tokenSecret, id)}`,
    email: outgoing.kind === 'email-change' ? (token.email ?? outgoing.email) : outgoing.email,
  };
};
