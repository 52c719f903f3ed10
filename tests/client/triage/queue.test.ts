import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { urgencies } from '#shared/red-flags/findings.ts';
import { groupQueue, stepInQueue } from '#src/features/triage/queue.ts';
import { aRow } from './flags.ts';

const at = (time: string) => `2026-12-01T${time}:00.000Z`;
const wendell = aRow({ id: 'wendell', urgency: 'emergency', raisedAt: at('08:41') });
const ines = aRow({ id: 'ines', urgency: 'urgent', raisedAt: at('07:12') });
const tobias = aRow({ id: 'tobias', urgency: 'urgent', raisedAt: at('06:50') });
const gwen = aRow({ id: 'gwen', urgency: 'routine', raisedAt: at('05:00') });
const flags = [gwen, ines, wendell, tobias];

const idsOf = (groups: ReturnType<typeof groupQueue>) =>
  groups.map(({ urgency, flags: rows }) => [urgency, ...rows.map(({ id }) => id)]);

describe('the queue', () => {
  it('puts the most urgent first, then whoever has waited longest, and leaves out what is empty', () => {
    expect(idsOf(groupQueue(flags))).toEqual([
      ['emergency', 'wendell'],
      ['urgent', 'tobias', 'ines'],
      ['routine', 'gwen'],
    ]);
  });

  it('loses no flag and reads the same in whatever order the flags came', () => {
    const anyFlags = fc.uniqueArray(
      fc.record({
        id: fc.uuid(),
        urgency: fc.constantFrom(...urgencies),
        raisedAt: fc.constantFrom(at('06:50'), at('07:12'), at('08:41')),
      }),
      { selector: ({ id }) => id },
    );
    fc.assert(
      fc.property(anyFlags, (given) => {
        const rows = given.map((part) => aRow(part));
        const groups = groupQueue(rows);
        expect(groups.flatMap((group) => group.flags)).toHaveLength(rows.length);
        expect(idsOf(groupQueue([...rows].reverse()))).toEqual(idsOf(groups));
      }),
    );
  });
});

describe('a step in the queue', () => {
  it('goes down and up across the groups and stops at the ends', () => {
    expect(stepInQueue(flags, wendell, 1)?.id).toBe('tobias');
    expect(stepInQueue(flags, gwen, -1)?.id).toBe('ines');
    expect(stepInQueue(flags, gwen, 1)).toBeNull();
    expect(stepInQueue(flags, wendell, -1)).toBeNull();
  });

  it('starts at the top when nothing is open', () => {
    expect(stepInQueue(flags, null, 1)?.id).toBe('wendell');
  });

  it('goes on from where a flag stood that has been closed since', () => {
    const left = flags.filter(({ id }) => id !== 'tobias');
    expect(stepInQueue(left, tobias, 1)?.id).toBe('ines');
    expect(stepInQueue(left, tobias, -1)?.id).toBe('wendell');
  });
});
