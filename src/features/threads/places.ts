import type { Side } from './seen-mark.ts';

/** Where the lists of threads stand; a thread's own address is below its list. */
const lists: Record<Side, string> = { patient: '/messages', clinic: '/clinic/messages' };

export const threadListPlace = (side: Side): string => lists[side];
export const threadPlace = (side: Side, threadId: string): string => `${lists[side]}/${threadId}`;
