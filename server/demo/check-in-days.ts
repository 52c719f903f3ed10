import { addDays, type LocalDate } from '#shared/plans/calendar.ts';
import { clock } from './moments.ts';
import type { Random } from './random.ts';
import type { PatientRecord } from './records.ts';
import type { Script, ScriptedCheckIn } from './scenario.ts';

export type PlannedCheckIn = { date: LocalDate; minutes: number; scripted: ScriptedCheckIn | null };

/** The days before today on which a script's usual is answered. */
export const daysOfUsual = 3;

/**
 * On which days somebody checks in, and at what time: most mornings at their own hour, less often as the months
 * pass. What is told of them comes first.
 */
export const checkInDaysOf = (
  { patient }: PatientRecord,
  script: Script,
  today: LocalDate,
  random: Random,
): PlannedCheckIn[] => {
  const habit = random.int(clock('6:25'), clock('9:25'));
  const drawnAdherence = 0.76 + 0.22 * random.next();
  const adherence = script.adherence ?? drawnAdherence;
  const daily: PlannedCheckIn[] = [];
  for (let day = 1; day <= patient.day; day += 1) {
    const date = addDays(today, day - patient.day);
    const minutes = habit + random.int(-22, 35);
    const isDrawn = random.chance(adherence - (day > 60 && script.adherence === undefined ? 0.08 : 0));
    const isSilent = script.silentFrom !== undefined && date >= script.silentFrom;
    if (isSilent || script.missed?.includes(date)) continue;
    const scripted = script.checkIns?.find((one) => one.kind === 'daily' && one.date === date) ?? null;
    const isNeeded = script.usual !== undefined && date < today && date >= addDays(today, -daysOfUsual);
    if (scripted) daily.push({ date, minutes: scripted.minutes, scripted });
    else if (isDrawn || isNeeded) daily.push({ date, minutes, scripted });
  }
  const news = (script.checkIns ?? [])
    .filter(({ kind }) => kind === 'something-new')
    .map((scripted) => ({ date: scripted.date, minutes: scripted.minutes, scripted }));
  return [...daily, ...news].sort((a, b) => a.date.localeCompare(b.date) || a.minutes - b.minutes);
};
