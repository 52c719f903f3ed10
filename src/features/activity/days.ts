import type { ActivityLine } from '#shared/caregivers/contract.ts';
import { localDateOf } from '#src/lib/format.ts';

export type ActivityDay = { date: string; lines: ActivityLine[] };

/** The lines by calendar day, in the order in which they came: newest first. A line stands once. */
export function byDay(lines: readonly ActivityLine[], timeZone?: string): ActivityDay[] {
  const days = new Map<string, Map<string, ActivityLine>>();
  for (const line of lines) {
    const date = localDateOf(line.at, timeZone);
    const day = days.get(date) ?? new Map<string, ActivityLine>();
    day.set(line.id, line);
    days.set(date, day);
  }
  return [...days].map(([date, day]) => ({ date, lines: [...day.values()] }));
}
