import type { QueryClient } from '@tanstack/react-query';
import type { Me } from '#shared/accounts/contract.ts';
import { chosenRecordId, keepChoice, recordOf } from './record-choice.ts';
import { armCalls, forgetData } from './session.tsx';

/** Somebody whom this tab looked after let this person in, and no longer does. */
export const hasCareEnded = (me: Me): boolean =>
  chosenRecordId(me.personId) !== null && recordOf(me) === null;

/** Goes over to another record. As after a new sign-in, nothing that was fetched for the one before stays. */
export function openRecord(queryClient: QueryClient, me: Me, recordId: string): void {
  keepChoice(me.personId, recordId);
  forgetData(queryClient);
  armCalls(me);
}
