import type {
  AuthenticationResponseJSON,
  PublicKeyCredentialCreationOptionsJSON,
  PublicKeyCredentialRequestOptionsJSON,
  RegistrationResponseJSON,
} from '@simplewebauthn/browser';
import type { askPasskeySignIn } from '#shared/accounts/contract.ts';
import type { OutputOf } from '#shared/http/contract.ts';

/** What the server asks, and what it verifies. */
type PasskeyQuestion = OutputOf<typeof askPasskeySignIn>;
type PasskeyAnswer = { challengeId: string; response: Record<string, unknown> };

/**
 * `cancelled`: the person closed the browser's own window, or had no passkey to choose; browsers do not say
 * which. `already-here`: the device holds a passkey of this person. `failed`: anything else.
 */
type TroubleKind = 'cancelled' | 'unsupported' | 'already-here' | 'failed';

/** The browser did not make or use a passkey. Nothing was sent to the server. */
export class PasskeyTrouble extends Error {
  readonly kind: TroubleKind;

  constructor(kind: TroubleKind, cause?: unknown) {
    super(`The browser did not answer with a passkey: ${kind}.`, { cause });
    this.name = 'PasskeyTrouble';
    this.kind = kind;
  }
}

export const passkeysSupported = (): boolean => typeof globalThis.PublicKeyCredential === 'function';

const library = () => import('@simplewebauthn/browser');

/** Fetched ahead, so that a press on a button reaches the browser's own window without a wait. */
export const preloadPasskeys = (): void => {
  if (!passkeysSupported()) return;
  // A failure shows at the press, which fetches it again.
  library().catch(() => undefined);
};

function troubleOf(error: unknown): PasskeyTrouble {
  const name = error instanceof Error ? error.name : '';
  if (name === 'NotAllowedError' || name === 'AbortError') return new PasskeyTrouble('cancelled', error);
  if (name === 'InvalidStateError') return new PasskeyTrouble('already-here', error);
  if (name === 'NotSupportedError' || name === 'ConstraintError' || name === 'SecurityError') {
    return new PasskeyTrouble('unsupported', error);
  }
  return new PasskeyTrouble('failed', error);
}

type Library = Awaited<ReturnType<typeof library>>;

async function ceremony(
  { challengeId }: PasskeyQuestion,
  run: (browser: Library) => Promise<RegistrationResponseJSON | AuthenticationResponseJSON>,
): Promise<PasskeyAnswer> {
  if (!passkeysSupported()) throw new PasskeyTrouble('unsupported');
  try {
    return { challengeId, response: { ...(await run(await library())) } };
  } catch (error) {
    throw troubleOf(error);
  }
}

/** The server's own library wrote the options, and the browser refuses what is wrong in them. */
const optionsOf = <Options>({ options }: PasskeyQuestion): Options => options as unknown as Options;

/** Lets the browser make a passkey. */
export const makePasskey = (question: PasskeyQuestion): Promise<PasskeyAnswer> =>
  ceremony(question, ({ startRegistration }) =>
    startRegistration({ optionsJSON: optionsOf<PublicKeyCredentialCreationOptionsJSON>(question) }),
  );

/** Lets the browser answer with a passkey that it, or a device beside it, holds. */
export const answerWithPasskey = (question: PasskeyQuestion): Promise<PasskeyAnswer> =>
  ceremony(question, ({ startAuthentication }) =>
    startAuthentication({ optionsJSON: optionsOf<PublicKeyCredentialRequestOptionsJSON>(question) }),
  );
