import { kindRules, type NotificationChannel, type NotificationKind } from '#shared/notifications/kinds.ts';

/** What somebody chose otherwise than by default, for one kind. */
export type Choices = Partial<Record<NotificationChannel, boolean>>;

/** An e-mail wakes nobody. */
export const wakingChannels = ['push', 'sms', 'phone'] as const satisfies readonly NotificationChannel[];

export const isWaking = (channel: NotificationChannel): boolean =>
  (wakingChannels as readonly NotificationChannel[]).includes(channel);

/** Whether a kind goes out on a channel: as chosen, or by default. What nobody chooses is as it is. */
export const isOn = (kind: NotificationKind, channel: NotificationChannel, choices: Choices): boolean => {
  const byDefault = kindRules[kind].channels.includes(channel);
  return kindRules[kind].chosenBy.length > 0 ? (choices[channel] ?? byDefault) : byDefault;
};

/**
 * The channels on which somebody is told of a kind, of those on which they can be reached. Where a page would wake
 * nobody, what its kind wakes by is used all the same, then whatever can wake; and in the end e-mail is better
 * than nothing.
 */
export const channelsFor = (
  kind: NotificationKind,
  choices: Choices,
  reachable: readonly NotificationChannel[],
): NotificationChannel[] => {
  const chosen = reachable.filter((channel) => isOn(kind, channel, choices));
  if (!kindRules[kind].mustReach || chosen.some(isWaking)) return chosen;
  const waking = reachable.filter(isWaking);
  const usual = waking.filter((channel) => kindRules[kind].channels.includes(channel));
  const added = usual.length > 0 ? usual : waking;
  return chosen.length + added.length > 0 ? [...chosen, ...added] : ['email'];
};
