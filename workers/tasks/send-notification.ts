import type { Sender } from '#server/notifications/sender.ts';

/**
 * What is owed stands in the rows; the job only says, at once, that one may be due. The sender takes the most
 * urgent first, and finds what is due again after a failure or after quiet hours by itself.
 */
export const sendNotificationTask = async (sender: Sender): Promise<void> => sender.wake();
