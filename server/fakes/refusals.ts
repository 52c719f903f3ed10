import { z } from 'zod';

const asked = z.object({
  until: z.iso.datetime(),
  channel: z.enum(['mail', 'push', 'gateway']).default('mail'),
  /** What push service and gateway answer meanwhile; mail is always told to try again. */
  status: z.number().int().min(400).max(599).default(503),
});
type Channel = z.output<typeof asked>['channel'];

export type Refusals = {
  /** The status to refuse with, or null while all is well. */
  now: (channel: Channel) => number | null;
  untilMs: (channel: Channel) => number;
  /** What was set; null where it could not be read. */
  set: (input: unknown) => z.output<typeof asked> | null;
};

/** Lets a test or a reader take each gateway down until an instant. */
export function openRefusals(): Refusals {
  const refused = new Map<Channel, { untilMs: number; status: number }>();
  const untilMs = (channel: Channel) => refused.get(channel)?.untilMs ?? 0;
  return {
    untilMs,
    now: (channel) => (Date.now() < untilMs(channel) ? (refused.get(channel)?.status ?? null) : null),
    set(input) {
      const parsed = asked.safeParse(input);
      if (!parsed.success) return null;
      const { channel, until, status } = parsed.data;
      refused.set(channel, { untilMs: Date.parse(until), status });
      return parsed.data;
    },
  };
}
