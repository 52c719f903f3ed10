import { and, eq, sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { Role } from '#shared/access/permissions.ts';
import type { changeNotificationSettingsBody, NotificationSettings } from '#shared/notifications/contract.ts';
import {
  kindRules,
  notificationChannels,
  notificationKinds,
  type NotificationChannel,
  type NotificationKind,
} from '#shared/notifications/kinds.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../db/actor.ts';
import { clinics } from '../db/schema/clinics.ts';
import { notificationSettings, pushSubscriptions } from '../db/schema/notifications.ts';
import { patients } from '../db/schema/patients.ts';
import { people } from '../db/schema/people.ts';
import type { Tx } from '../db/with-tx.ts';
import { writeAudit } from '../features/audit/service.ts';
import { readPhone } from '../features/people/new-person.ts';
import { isOn, isWaking, wakingChannels, type Choices } from './choices.ts';
import { ofClinicOfPerson, ofRecordOfPerson, zoneOfPerson } from './recipients.ts';

type Body = z.output<typeof changeNotificationSettingsBody>;
type ChoicesByKind = Map<NotificationKind, Choices>;

/** The kinds that somebody with these roles is asked about. */
const kindsFor = (roles: readonly Role[]): NotificationKind[] =>
  notificationKinds.filter((kind) => kindRules[kind].chosenBy.some((role) => roles.includes(role)));

const isMine = ({ clinicId, personId }: PersonActor) =>
  and(eq(people.clinicId, clinicId), eq(people.id, personId));

const rowOf = async (tx: Tx, actor: PersonActor) => {
  const rows = await tx
    .select({
      person: people,
      country: clinics.country,
      timeZone: zoneOfPerson,
      /** What holds where the person says nothing. */
      zoneByDefault: sql<string>`coalesce(${patients.timeZone}, ${clinics.timeZone})`,
    })
    .from(people)
    .innerJoin(clinics, ofClinicOfPerson)
    .leftJoin(patients, ofRecordOfPerson)
    .where(isMine(actor));
  const row = rows[0];
  if (!row) throw new Error('An actor without a person.');
  return row;
};

const choicesOf = async (tx: Tx, { clinicId, personId }: PersonActor): Promise<ChoicesByKind> => {
  const rows = await tx
    .select()
    .from(notificationSettings)
    .where(and(eq(notificationSettings.clinicId, clinicId), eq(notificationSettings.personId, personId)));
  const byKind: ChoicesByKind = new Map();
  for (const { kind, channel, enabled } of rows) {
    byKind.set(kind, { ...byKind.get(kind), [channel]: enabled });
  }
  return byKind;
};

const wakesBy = (kind: NotificationKind, choices: Choices): NotificationChannel[] =>
  wakingChannels.filter((channel) => isOn(kind, channel, choices));

/** What one's pages need and have not: nothing for those who are not paged. */
const missingFor = async (
  tx: Tx,
  { clinicId, personId, roles }: PersonActor,
  { phone, choices }: { phone: string | null; choices: ChoicesByKind },
): Promise<NotificationSettings['missing']> => {
  const pages = kindsFor(roles).filter((kind) => kindRules[kind].mustReach);
  const wakes = new Set(pages.flatMap((kind) => wakesBy(kind, choices.get(kind) ?? {})));
  const devices = await tx.$count(
    pushSubscriptions,
    and(eq(pushSubscriptions.clinicId, clinicId), eq(pushSubscriptions.personId, personId)),
  );
  return [
    ...((wakes.has('sms') || wakes.has('phone')) && phone === null ? (['phone'] as const) : []),
    ...(wakes.has('push') && devices === 0 ? (['push'] as const) : []),
  ];
};

export const settingsOf = async (tx: Tx, actor: PersonActor): Promise<NotificationSettings> => {
  const { person, timeZone } = await rowOf(tx, actor);
  const choices = await choicesOf(tx, actor);
  const { phone, email, quietFrom, quietUntil, remindAt } = person;
  return {
    choices: kindsFor(actor.roles).flatMap((kind) => {
      const chosen = choices.get(kind) ?? {};
      const onlyOne = kindRules[kind].mustReach && wakesBy(kind, chosen).length === 1;
      return notificationChannels.map((channel) => {
        const enabled = isOn(kind, channel, chosen);
        return { kind, channel, enabled, locked: enabled && onlyOne && isWaking(channel) };
      });
    }),
    missing: await missingFor(tx, actor, { phone, choices }),
    phone,
    email,
    emailBounced: person.emailBouncedAt !== null,
    timeZone,
    quietFrom,
    quietUntil,
    remindAt,
  };
};

const refuseChoice = (index: number | null, message: string): Problem =>
  new Problem('invalid-input', undefined, {
    errors: [{ field: index === null ? 'choices' : `choices.${index}`, message }],
  });

/** Refuses what is not this person's to choose, and a page that would wake nobody. */
const assertMayChoose = (roles: readonly Role[], chosen: Body['choices'], before: ChoicesByKind): void => {
  const kinds = kindsFor(roles);
  const foreign = chosen.findIndex(({ kind }) => !kinds.includes(kind));
  if (foreign >= 0) throw refuseChoice(foreign, 'This kind is not one that you can choose.');
  for (const kind of kinds.filter((one) => kindRules[one].mustReach)) {
    const after: Choices = { ...before.get(kind) };
    for (const one of chosen) if (one.kind === kind) after[one.channel] = one.enabled;
    if (wakesBy(kind, after).length > 0) continue;
    const last = chosen.findLastIndex((one) => one.kind === kind);
    throw refuseChoice(
      last >= 0 ? last : null,
      'Leave push, SMS or the telephone call on here: an e-mail wakes nobody, and this must reach you.',
    );
  }
};

/** Keeps what was chosen. Kinds and channels that are not named stay as they were. */
export const changeSettings = async (
  tx: Tx,
  actor: PersonActor,
  { choices, phone, timeZone, quietFrom, quietUntil, remindAt }: Body,
  now: Date,
): Promise<NotificationSettings> => {
  const { clinicId, personId, roles } = actor;
  assertMayChoose(roles, choices, await choicesOf(tx, actor));
  const { country, zoneByDefault } = await rowOf(tx, actor);
  await tx
    .update(people)
    .set({
      phone: phone === null ? null : readPhone(phone, country),
      // A zone that is the default's stays the default's, so that it follows when the record's is changed.
      timeZone: timeZone === zoneByDefault ? null : timeZone,
      quietFrom,
      quietUntil,
      remindAt,
    })
    .where(isMine(actor));
  for (const { kind, channel, enabled } of choices) {
    await tx
      .insert(notificationSettings)
      .values({ clinicId, personId, kind, channel, enabled })
      .onConflictDoUpdate({
        target: [
          notificationSettings.clinicId,
          notificationSettings.personId,
          notificationSettings.kind,
          notificationSettings.channel,
        ],
        set: { enabled },
      });
  }
  await writeAudit(tx, actor, { action: 'notification-settings.changed', subjectId: personId }, now);
  return settingsOf(tx, actor);
};
