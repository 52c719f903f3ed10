import { pino, type Logger } from 'pino';

const framesShown = 12;

/**
 * Where an error was thrown. Its message is cut out as a whole first: what a person typed may stand in it, also
 * on lines that look like a place.
 */
export const framesOf = ({ stack, message }: Error): string[] => {
  const messageAt = stack?.indexOf(message) ?? -1;
  if (!stack || messageAt < 0) return [];
  return stack
    .slice(messageAt + message.length)
    .split('\n')
    .filter((line) => line.trimStart().startsWith('at '))
    .slice(0, framesShown);
};

/** Logs hold ids, counts and times: no name, no address, no answer, no message. */
export const createLog = (name: string, level: string): Logger =>
  pino({
    name,
    level,
    serializers: {
      // The message of a database error can quote what a person typed; its class and place are enough.
      err: (error: Error & { code?: unknown }) => ({
        type: error.name,
        code: error.code,
        stack: framesOf(error),
      }),
    },
  });
