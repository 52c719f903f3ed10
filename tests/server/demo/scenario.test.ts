import { expect, test } from 'vitest';
import { conversationsOn } from '#server/demo/conversations.ts';
import { flagOf } from '#server/demo/flags.ts';
import { historyOf } from '#server/demo/histories.ts';
import { clock, instantAt } from '#server/demo/moments.ts';
import { patientsOfDemo } from '#server/demo/patients.ts';
import { recordOf } from '#server/demo/records.ts';
import { scenarioOn } from '#server/demo/scenario.ts';

/** The days on which something could go wrong: a weekend, a Monday, the days of clock changes, a leap day. */
const dates = ['2026-12-05', '2026-12-07', '2027-03-14', '2026-11-01', '2028-02-29'];

test.each(dates)(
  'the morning of %s holds the same round as any other',
  (today) => {
    const scenario = scenarioOn(today);
    const open = patientsOfDemo.flatMap((patient) => {
      const record = recordOf(patient, today);
      return historyOf(record, scenario[patient.name] ?? {}, today)
        .map((checkIn) => flagOf(record, checkIn)?.flag)
        .flatMap((flag) => (flag && flag.state !== 'closed' ? [`${flag.urgency} ${flag.state}`] : []));
    });
    expect(open.sort()).toEqual(
      [
        'emergency claimed',
        ...Array.from({ length: 6 }, () => 'same-day open'),
        'same-day claimed',
        ...Array.from({ length: 2 }, () => 'urgent open'),
        'urgent claimed',
      ].sort(),
    );
  },
  60_000,
);

test.each(dates)(
  'the threads of %s were written after their patients’ surgery, and none after breakfast of today',
  (today) => {
    const end = instantAt(today, clock('10:00'));
    for (const { thread, messages } of conversationsOn(today)) {
      const patient = patientsOfDemo
        .map((one) => recordOf(one, today))
        .find(({ chart }) => chart.patient.id === thread.patientId)!;
      for (const { sentAt } of messages) {
        expect(sentAt.getTime(), thread.subject).toBeGreaterThan(instantAt(patient.surgeryDate, 0).getTime());
        expect(sentAt.getTime(), thread.subject).toBeLessThan(end.getTime());
      }
    }
  },
);

test('everybody of whom something is told is a patient of the demo', () => {
  const names = patientsOfDemo.map(({ name }) => name);
  expect(Object.keys(scenarioOn('2026-12-01')).filter((name) => !names.includes(name))).toEqual([]);
});
