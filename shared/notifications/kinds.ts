import type { Role } from '../access/permissions.ts';

export const notificationChannels = ['push', 'email', 'sms', 'phone'] as const;
export type NotificationChannel = (typeof notificationChannels)[number];

export const notificationStates = ['pending', 'sent', 'failed', 'bounced', 'dropped'] as const;

/** Every kind of word that leaves the product. None holds a name or a health fact. */
export const notificationKinds = [
  'new-emergency',
  'new-urgent',
  'new-flag',
  'new-message',
  'check-in-reminder',
  'invitation',
  'password-reset',
  'email-change',
  'sign-in-changed',
  'two-person-act',
  'invitation-asked',
  'watching-ended',
  'caring-began',
  'test',
] as const;
export type NotificationKind = (typeof notificationKinds)[number];

const clinicians = ['therapist', 'on-call-clinician', 'clinical-lead'] as const;
const careSide = ['patient', 'caregiver'] as const;

type KindRule = {
  /** Who is asked about it in the settings; an empty list is a kind that nobody can turn off. */
  chosenBy: readonly Role[];
  /** Where it goes unless the person chose otherwise. */
  channels: readonly NotificationChannel[];
  /** It rings in quiet hours too. */
  passesQuietHours: boolean;
  /** A page: at least one channel besides e-mail that can wake somebody stays on. */
  mustReach: boolean;
  /** Lower is sent first. */
  rank: number;
};

/** The rules of each kind. A telephone is what an emergency rings by default: a phone on silent must ring. */
export const kindRules: Record<NotificationKind, KindRule> = {
  'new-emergency': {
    chosenBy: clinicians,
    channels: ['push', 'email', 'sms', 'phone'],
    passesQuietHours: true,
    mustReach: true,
    rank: 0,
  },
  'new-urgent': {
    chosenBy: clinicians,
    channels: ['push', 'email', 'sms'],
    passesQuietHours: true,
    mustReach: true,
    rank: 1,
  },
  'new-flag': {
    chosenBy: clinicians,
    channels: ['push', 'email'],
    passesQuietHours: false,
    mustReach: false,
    rank: 3,
  },
  'new-message': {
    chosenBy: [...careSide, ...clinicians],
    channels: ['push', 'email'],
    passesQuietHours: false,
    mustReach: false,
    rank: 3,
  },
  'check-in-reminder': {
    chosenBy: careSide,
    channels: ['push', 'email'],
    passesQuietHours: false,
    mustReach: false,
    rank: 4,
  },
  invitation: { chosenBy: [], channels: ['email'], passesQuietHours: true, mustReach: false, rank: 2 },
  'password-reset': { chosenBy: [], channels: ['email'], passesQuietHours: true, mustReach: false, rank: 2 },
  'email-change': { chosenBy: [], channels: ['email'], passesQuietHours: true, mustReach: false, rank: 2 },
  'sign-in-changed': { chosenBy: [], channels: ['email'], passesQuietHours: true, mustReach: false, rank: 2 },
  'two-person-act': { chosenBy: [], channels: ['email'], passesQuietHours: false, mustReach: false, rank: 4 },
  'invitation-asked': {
    chosenBy: [],
    channels: ['email'],
    passesQuietHours: false,
    mustReach: false,
    rank: 4,
  },
  'watching-ended': { chosenBy: [], channels: ['email'], passesQuietHours: false, mustReach: false, rank: 4 },
  'caring-began': { chosenBy: [], channels: ['email'], passesQuietHours: true, mustReach: false, rank: 2 },
  test: { chosenBy: [], channels: [], passesQuietHours: true, mustReach: false, rank: 2 },
};
