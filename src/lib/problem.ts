import type { FieldError, ProblemBody, ProblemCode } from '#shared/problems/problems.ts';

const typePrefix = 'urn:espalier:problem:';

/** The catalogue's own values are not loaded: its texts come with each answer. */
function codeOf({ type, status }: ProblemBody): ProblemCode {
  if (type.startsWith(typePrefix)) return type.slice(typePrefix.length) as ProblemCode;
  return status >= 500 ? 'unavailable' : 'malformed-request';
}

/** The server answered, and refused. Its title and detail are plain enough to be shown as they are. */
export class ApiProblem extends Error {
  readonly code: ProblemCode;
  readonly status: number;
  readonly body: ProblemBody;

  constructor(body: ProblemBody) {
    super(body.detail ?? body.title);
    this.name = 'ApiProblem';
    this.code = codeOf(body);
    this.status = body.status;
    this.body = body;
  }

  get fieldErrors(): FieldError[] {
    return this.body.errors ?? [];
  }
}

/** Nothing of Espalier answered: no network, no server, or something in between that answers in its place. */
export class Unreachable extends Error {
  constructor(cause?: unknown) {
    super('Espalier cannot be reached.', { cause });
    this.name = 'Unreachable';
  }
}

/** Whether the same request may succeed later without anybody changing it. */
export const mayPassLater = (error: unknown): boolean =>
  error instanceof Unreachable ||
  (error instanceof ApiProblem && (error.status >= 500 || error.status === 429));
