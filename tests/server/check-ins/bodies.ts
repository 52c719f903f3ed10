import { randomUUID } from 'node:crypto';
import type { PostAlert, PostCheckIn } from '#shared/check-ins/contract.ts';

/** A check-in as a phone with a right clock sends it; all is well unless answers say otherwise. */
export const checkInBody = (changes: Partial<PostCheckIn> = {}): PostCheckIn => {
  const at = new Date().toISOString();
  return {
    id: randomUUID(),
    kind: 'daily',
    answers: { painNow: 2, painWorst: 3, dangerNone: true, symptomsNone: true },
    answeredAt: at,
    sentAt: at,
    rulesVersion: 'shipped-1',
    ...changes,
  };
};

/** An emergency tick of its own, unless changes say otherwise. */
export const alertBody = (changes: Partial<PostAlert> = {}): PostAlert => {
  const at = new Date().toISOString();
  return {
    id: randomUUID(),
    checkInId: randomUUID(),
    answers: { danger: ['bleeding'] },
    answeredAt: at,
    sentAt: at,
    rulesVersion: 'shipped-1',
    ...changes,
  };
};
