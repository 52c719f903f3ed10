import twilio from 'twilio';
import { GatewayFailure } from './gateway-failure.ts';
import { NotDeliverable } from './channels.ts';

const timeoutMs = 10_000;

export type TelephoneGateway = {
  accountSid: string;
  authToken: string;
  /** The number that calls and messages come from, E.164. */
  from: string;
  /** The local fake that takes the place of the gateway's public host. */
  apiUrl?: string | undefined;
};

/** Sends what the SDK asks for to another host: the only difference between a fake and the real gateway. */
class LocalRequestClient extends twilio.RequestClient {
  private readonly apiUrl: string;

  constructor(apiUrl: string) {
    super({ timeout: timeoutMs });
    this.apiUrl = apiUrl;
  }

  override request<T>(options: Parameters<twilio.RequestClient['request']>[0]) {
    const { pathname, search } = new URL(options.uri);
    return super.request<T>({
      ...options,
      uri: new URL(`${pathname}${search}`, this.apiUrl).href,
    } as Parameters<typeof twilio.RequestClient.prototype.request<T>>[0]);
  }
}

export const telephoneClient = ({ accountSid, authToken, apiUrl }: TelephoneGateway): twilio.Twilio =>
  twilio(accountSid, authToken, {
    httpClient: apiUrl ? new LocalRequestClient(apiUrl) : new twilio.RequestClient({ timeout: timeoutMs }),
  });

/**
 * The gateway's codes for a number that no further try will reach: not a number, cannot take messages, on no
 * network that is served, or its holder asked for no more messages.
 */
const hopelessCodes = new Set([21211, 21214, 21217, 21219, 21401, 21407, 21421, 21610, 21612, 21614, 21635]);

/**
 * Runs one request to the gateway. Its errors hold the telephone number and the credentials, so none of them
 * goes any further than here.
 */
export const askGateway = async <T extends { sid: string }>(
  ask: () => Promise<T>,
): Promise<{ providerId: string }> => {
  try {
    return { providerId: (await ask()).sid };
  } catch (error) {
    if (error instanceof twilio.RestException) {
      if (error.code !== undefined && hopelessCodes.has(error.code)) throw new NotDeliverable('refused');
      throw new GatewayFailure(`gateway-${error.code ?? error.status}`);
    }
    throw GatewayFailure.from(error);
  }
};
