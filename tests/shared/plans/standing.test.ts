import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { addDays, daysBetween } from '#shared/plans/calendar.ts';
import type { SignOff } from '#shared/plans/plan.ts';
import { reverseReplacement as plan } from '#shared/plans/reverse-replacement.ts';
import { standingOn, type Standing } from '#shared/plans/standing.ts';

const surgeryDate = '2025-11-07';
const onDay = (day: number, signOffs: SignOff[] = []): Standing =>
  standingOn({ plan, surgeryDate, date: addDays(surgeryDate, day), signOffs });
const inForce = ({ precautions }: Standing): string[] => precautions.map(({ code }) => code);

const anySignOff = fc.record({
  kind: fc.constantFrom('open-phase' as const, 'lift-precaution' as const),
  code: fc.constantFrom(...plan.phases.map(({ code }) => code), ...plan.precautions.map(({ code }) => code)),
  on: fc.integer({ min: 0, max: 200 }).map((days) => addDays(surgeryDate, days)),
});

describe('where a person stands in the plan', () => {
  test('day 24: Protect, 18 days to the review at week 6 on 19 December', () => {
    const standing = onDay(24);
    expect(standing).toMatchObject({ day: 24, week: 3, phase: { code: 'protect' } });
    expect(standing.review).toEqual({ day: 42, week: 6, date: '2025-12-19', daysTo: 18 });
  });

  test('a phase stays current past its usual end until a clinician opens the next', () => {
    expect(onDay(60).phase?.code).toBe('protect');
    expect(onDay(60).review?.daysTo).toBe(-18);
    const opened: SignOff[] = [{ kind: 'open-phase', code: 'motion', on: addDays(surgeryDate, 45) }];
    expect(onDay(44, opened).phase?.code).toBe('protect');
    expect(onDay(45, opened).phase).toMatchObject({
      code: 'motion',
      openedOnDay: 45,
      openedOn: '2025-12-22',
    });
    expect(onDay(45, opened).review).toMatchObject({ week: 12, day: 84, date: '2026-01-30' });
  });

  test('the last phase has no usual end, so no review is planned', () => {
    expect(
      onDay(130, [{ kind: 'open-phase', code: 'return', on: addDays(surgeryDate, 115) }]).review,
    ).toBeNull();
  });

  test('before surgery nothing is in force, nothing is due and no phase is current', () => {
    const standing = onDay(-3);
    expect(standing).toMatchObject({ day: -3, phase: null, precautions: [], exercises: [], review: null });
  });

  test('a precaution may be lifted from its earliest week and falls due in its usual week', () => {
    const sling = (day: number) => onDay(day).precautions.find(({ code }) => code === 'sling');
    expect(sling(27)).toMatchObject({ mayBeLifted: false, due: false, earliestDate: '2025-12-05' });
    expect(sling(28)).toMatchObject({ mayBeLifted: true, due: false, usualDate: '2025-12-19' });
    expect(sling(41)).toMatchObject({ due: false });
    expect(sling(42)).toMatchObject({ due: true });
  });

  test('a lift counts from its own date on, and a past day still shows what was in force then', () => {
    const lifted: SignOff[] = [{ kind: 'lift-precaution', code: 'sling', on: addDays(surgeryDate, 30) }];
    expect(inForce(onDay(29, lifted))).toContain('sling');
    expect(inForce(onDay(30, lifted))).not.toContain('sling');
    expect(inForce(onDay(30, lifted))).toHaveLength(plan.precautions.length - 1);
  });

  test('the limit of passive elevation is 90° at first and 120° from week 4', () => {
    const limit = (day: number) =>
      onDay(day).precautions.find(({ code }) => code === 'passive-elevation-limit')?.limitDegrees;
    expect([limit(0), limit(27), limit(28)]).toEqual([90, 90, 120]);
  });

  test('the light elbow press joins the exercises in week 3', () => {
    const exercises = (day: number) => onDay(day).exercises.map(({ code }) => code);
    expect(exercises(20)).toEqual(['grip-squeeze', 'elbow-bend', 'supported-lean', 'blade-set']);
    expect(exercises(21)).toContain('elbow-press');
  });

  test('a precaution never disappears without the sign-off that lifts it, however late it is', () => {
    fc.assert(
      fc.property(
        fc.array(anySignOff, { maxLength: 12 }),
        fc.integer({ min: 0, max: 2000 }),
        (signOffs, day) => {
          const date = addDays(surgeryDate, day);
          const lifted = signOffs
            .filter(({ kind, on }) => kind === 'lift-precaution' && on <= date)
            .map(({ code }) => code);
          const expected = plan.precautions.map(({ code }) => code).filter((code) => !lifted.includes(code));
          expect(inForce(onDay(day, signOffs))).toEqual(expected);
        },
      ),
    );
  });

  test('moving the surgery date by n days moves every date by n and nothing else', () => {
    const datesOf = ({ precautions, phases, review }: Standing): (string | null)[] => [
      ...precautions.flatMap(({ earliestDate, usualDate }) => [earliestDate, usualDate]),
      ...phases.flatMap(({ openedOn, usualStartDate, usualEndDate }) => [
        openedOn,
        usualStartDate,
        usualEndDate,
      ]),
      review?.date ?? null,
    ];
    fc.assert(
      fc.property(
        fc.array(anySignOff, { maxLength: 6 }),
        fc.integer({ min: 0, max: 150 }),
        fc.integer({ min: -400, max: 400 }),
        (signOffs, day, n) => {
          const before = onDay(day, signOffs);
          const after = standingOn({
            plan,
            surgeryDate: addDays(surgeryDate, n),
            date: addDays(surgeryDate, day + n),
            signOffs: signOffs.map((signOff) => ({ ...signOff, on: addDays(signOff.on, n) })),
          });
          expect(datesOf(after)).toEqual(datesOf(before).map((date) => date && addDays(date, n)));
          expect([after.day, after.week, after.phase?.code, inForce(after)]).toEqual([
            before.day,
            before.week,
            before.phase?.code,
            inForce(before),
          ]);
        },
      ),
    );
  });

  test('every usual date is its week after surgery', () => {
    for (const { usualDate, usualWeek, earliestDate, earliestWeek } of onDay(0).precautions) {
      expect(daysBetween(surgeryDate, usualDate)).toBe(usualWeek * 7);
      expect(daysBetween(surgeryDate, earliestDate)).toBe(earliestWeek * 7);
    }
  });
});
