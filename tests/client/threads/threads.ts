import type { Message, ThreadDetail } from '#shared/threads/contract.ts';

export const threadId = '4f7c1d1e-6d2b-4c19-9b57-0d9f6b9a2c11';
export const inesId = '0b6ff3a6-53d0-4f53-8c56-9d0a4c1f7e21';
export const noorId = '7a4d6f0e-0f38-4a5f-a1a5-0d5b3f2c9e31';

const ines: Message['author'] = { personId: inesId, name: 'Ines Valcourt', side: 'patient' };
const noor: Message['author'] = { personId: noorId, name: 'Noor Haddad', side: 'clinic' };
export const authors = { ines, noor };

/** A message whose ids follow from its sequence, unless they are given. */
export function aMessage(given: Partial<Message> & { sequence: number }): Message {
  const tail = String(given.sequence).padStart(12, '0');
  return {
    id: `10000000-0000-4000-8000-${tail}`,
    clientId: `20000000-0000-4000-8000-${tail}`,
    threadId,
    kind: 'message',
    author: ines,
    text: `Message ${given.sequence}`,
    sentAt: '2026-12-01T07:14:00.000Z',
    ...given,
  };
}

export function aThread(given: Partial<ThreadDetail> = {}): ThreadDetail {
  return {
    id: threadId,
    subject: 'Damp dressing',
    state: 'waiting-on-us',
    patient: { id: '5f1f3d1c-7a5e-4f4e-8a52-8c1d3e5f7a91', name: 'Ines Valcourt', day: 24 },
    lastSequence: 1,
    lastText: 'Message 1',
    lastAt: '2026-12-01T07:14:00.000Z',
    unseen: 0,
    flagId: null,
    participants: [],
    ...given,
  };
}
