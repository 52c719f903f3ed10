/**
 * The first part of every query key. A hint names a topic, and what begins with the topic's prefixes is
 * fetched again; nothing is fetched that is not on the screen.
 */
export const queryPrefixes = {
  session: ['session'],
  today: ['today'],
  plan: ['plan'],
  checkInContext: ['check-in-context'],
  alerts: ['alerts'],
  flags: ['flags'],
  threads: ['threads'],
  worker: ['worker'],
  patients: ['patients'],
  people: ['people'],
  twoPersonActs: ['two-person-acts'],
  deliveries: ['deliveries'],
  caregivers: ['caregivers'],
  activity: ['activity'],
  notificationSettings: ['notification-settings'],
  pushSubscriptions: ['push-subscriptions'],
} as const satisfies Record<string, readonly [string]>;
