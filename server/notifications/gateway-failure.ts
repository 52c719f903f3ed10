/**
 * A gateway could not be reached or is busy: worth another try. It keeps a code and nothing else, for the errors
 * of HTTP clients carry the request with them: telephone numbers, addresses of browsers, keys.
 */
export class GatewayFailure extends Error {
  readonly code: string;

  constructor(code: string) {
    super(`The gateway failed (${code}).`);
    this.name = 'GatewayFailure';
    this.code = code;
  }

  static from(error: unknown): GatewayFailure {
    if (!(error instanceof Error)) return new GatewayFailure('unknown');
    if (error.name === 'TimeoutError') return new GatewayFailure('timeout');
    return new GatewayFailure('code' in error && typeof error.code === 'string' ? error.code : 'unknown');
  }
}
