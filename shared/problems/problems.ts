/**
 * The one catalogue of problems (RFC 9457). A problem's `type` is `urn:espalier:problem:<code>`;
 * its title is plain enough to be shown to a person as it is.
 */
export const problems = {
  'invalid-input': { status: 422, title: 'Something in this form is not right.' },
  'malformed-request': { status: 400, title: 'The request could not be read.' },
  'not-signed-in': { status: 401, title: 'Please sign in.' },
  'wrong-sign-in': { status: 401, title: 'That e-mail and password do not match.' },
  'wrong-code': { status: 401, title: 'That code or passkey is not right.' },
  'too-many-attempts': { status: 429, title: 'Too many tries. Please wait a little.' },
  forbidden: { status: 403, title: 'Your role does not allow this.' },
  'foreign-request': {
    status: 403,
    title: 'This request did not come from Espalier. Please reload the page.',
  },
  'proof-needed': { status: 403, title: 'Please prove again that it is you.' },
  'second-factor-needed': { status: 403, title: 'Set up a second factor first.' },
  'reason-needed': { status: 403, title: 'You are not on this care team. Say why you open this chart.' },
  'link-spent': { status: 410, title: 'This link or code can no longer be used.' },
  'not-watched': { status: 409, title: 'The clinic no longer watches this record.' },
  'not-found': { status: 404, title: 'There is nothing here, or it is not yours to see.' },
  'state-conflict': { status: 409, title: 'This has changed in the meantime.' },
  'claimed-by-other': { status: 409, title: 'A colleague has claimed this flag.' },
  'id-conflict': { status: 409, title: 'This was already sent with other content.' },
  'too-large': { status: 413, title: 'This is too large to send.' },
  'unsupported-content': { status: 415, title: 'The server takes JSON here.' },
  unavailable: { status: 503, title: 'The service is not ready. Please try again in a minute.' },
  internal: { status: 500, title: 'Something went wrong on our side. It has been reported.' },
} as const;

export type ProblemCode = keyof typeof problems;

/** One field that was not accepted, by its path in the body (`answers.painNow`). */
export type FieldError = { field: string; message: string };

/** The body of a problem answer, `application/problem+json`. */
export type ProblemBody = {
  type: string;
  title: string;
  status: number;
  detail?: string;
  errors?: FieldError[];
  /** Seconds until another try makes sense. */
  retryAfter?: number;
  /** Who holds what was asked for. */
  claimedBy?: string;
  /** Names the report in the server's log; only with `internal`. */
  reportId?: string;
};

export const problemType = (code: ProblemCode): string => `urn:espalier:problem:${code}`;

/** An expected refusal. Anything else that is thrown is reported and answered with a bare 500. */
export class Problem extends Error {
  readonly code: ProblemCode;
  readonly extra: Omit<Partial<ProblemBody>, 'type' | 'title' | 'status' | 'detail'>;

  constructor(code: ProblemCode, detail?: string, extra: Problem['extra'] = {}) {
    super(detail ?? problems[code].title);
    this.name = 'Problem';
    this.code = code;
    this.extra = extra;
  }

  get status(): number {
    return problems[this.code].status;
  }

  toBody(): ProblemBody {
    const { status, title } = problems[this.code];
    const detail = this.message === title ? {} : { detail: this.message };
    return { type: problemType(this.code), title, status, ...detail, ...this.extra };
  }
}
