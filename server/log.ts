import { pino, type Logger } from 'pino';

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
        stack: error.stack
          ?.split('\n')
          .filter((line) => line.trimStart().startsWith('at '))
          .slice(0, 12),
      }),
    },
  });
