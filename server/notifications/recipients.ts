import { and, eq, inArray, sql } from 'drizzle-orm';
import type { NotificationChannel, NotificationKind } from '#shared/notifications/kinds.ts';
import { clinics } from '../db/schema/clinics.ts';
import { notificationSettings, pushSubscriptions } from '../db/schema/notifications.ts';
import { patients } from '../db/schema/patients.ts';
import { people } from '../db/schema/people.ts';
import type { Tx } from '../db/with-tx.ts';
import type { Choices } from './choices.ts';
import type { QuietHours } from './quiet-hours.ts';

/** Where somebody's days and hours are counted: as they said, as their record says, or as the clinic's do. */
export const zoneOfPerson = sql<string>`coalesce(${people.timeZone}, ${patients.timeZone}, ${clinics.timeZone})`;

export const ofClinicOfPerson = eq(clinics.id, people.clinicId);
export const ofRecordOfPerson = and(eq(patients.clinicId, people.clinicId), eq(patients.personId, people.id));

export type Recipient = {
  personId: string;
  timeZone: string;
  quiet: QuietHours | null;
  choices: Choices;
  /** The browsers that may be woken. */
  subscriptionIds: string[];
  reachable: NotificationChannel[];
};

/** Those of the people named who are still with the clinic, and how each can be reached about a kind. */
export const recipientsOf = async (
  tx: Tx,
  clinicId: string,
  personIds: readonly string[],
  kind: NotificationKind,
): Promise<Recipient[]> => {
  const ids = [...new Set(personIds)];
  const rows = await tx
    .select({
      personId: people.id,
      phone: people.phone,
      timeZone: zoneOfPerson,
      quietFrom: people.quietFrom,
      quietUntil: people.quietUntil,
    })
    .from(people)
    .innerJoin(clinics, ofClinicOfPerson)
    .leftJoin(patients, ofRecordOfPerson)
    .where(and(eq(people.clinicId, clinicId), inArray(people.id, ids), eq(people.active, true)));
  const chosen = await tx
    .select()
    .from(notificationSettings)
    .where(
      and(
        eq(notificationSettings.clinicId, clinicId),
        inArray(notificationSettings.personId, ids),
        eq(notificationSettings.kind, kind),
      ),
    );
  const subscriptions = await tx
    .select({ id: pushSubscriptions.id, personId: pushSubscriptions.personId })
    .from(pushSubscriptions)
    .where(and(eq(pushSubscriptions.clinicId, clinicId), inArray(pushSubscriptions.personId, ids)));
  return rows.map(({ personId, phone, timeZone, quietFrom, quietUntil }) => {
    const isTheirs = (row: { personId: string }) => row.personId === personId;
    const subscriptionIds = subscriptions.filter(isTheirs).map(({ id }) => id);
    return {
      personId,
      timeZone,
      quiet: quietFrom && quietUntil ? { from: quietFrom, until: quietUntil } : null,
      choices: Object.fromEntries(chosen.filter(isTheirs).map(({ channel, enabled }) => [channel, enabled])),
      subscriptionIds,
      reachable: [
        ...(subscriptionIds.length > 0 ? (['push'] as const) : []),
        'email',
        ...(phone ? (['sms', 'phone'] as const) : []),
      ],
    };
  });
};
