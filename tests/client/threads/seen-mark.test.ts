import { describe, expect, it } from 'vitest';
import type { ThreadDetail } from '#shared/threads/contract.ts';
import { seenMarkOf } from '#src/features/threads/seen-mark.ts';
import { aMessage, authors } from './threads.ts';

type Participant = ThreadDetail['participants'][number];

const ines = (seenSequence: number, seenAt: string | null): Participant => ({
  personId: 'ines',
  name: 'Ines Valcourt',
  side: 'patient',
  seenSequence,
  seenAt,
});
const clinician = (name: string, seenSequence: number, seenAt: string | null): Participant => ({
  personId: name,
  name,
  side: 'clinic',
  seenSequence,
  seenAt,
});

const messages = [
  aMessage({ sequence: 1, author: authors.ines }),
  aMessage({ sequence: 2, author: authors.noor }),
  aMessage({ sequence: 3, author: authors.noor }),
  aMessage({ sequence: 4, author: authors.ines }),
];

describe('the seen line', () => {
  it('stands on the newest message of one’s own side that the other side has had on the screen', () => {
    expect(seenMarkOf(messages, [ines(2, '2026-12-01T08:07:00.000Z')], 'clinic')).toEqual({
      sequence: 2,
      by: 'Ines Valcourt',
      at: '2026-12-01T08:07:00.000Z',
    });
  });

  it('does not count what one’s own side has seen', () => {
    const readers = [clinician('Noor Haddad', 4, '2026-12-01T08:00:00.000Z'), ines(0, null)];
    expect(seenMarkOf(messages, readers, 'clinic')).toBeNull();
  });

  it('names whoever of the other side got there first', () => {
    const readers = [
      clinician('Petra Lindqvist', 4, '2026-12-01T08:30:00.000Z'),
      clinician('Noor Haddad', 4, '2026-12-01T08:02:00.000Z'),
    ];
    expect(seenMarkOf(messages, readers, 'patient')).toEqual({
      sequence: 4,
      by: 'Noor Haddad',
      at: '2026-12-01T08:02:00.000Z',
    });
  });
});
