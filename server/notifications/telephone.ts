import twilio from 'twilio';
import type { NotificationKind } from '#shared/notifications/kinds.ts';
import { NotDeliverable, type Channel } from './channels.ts';
import { askGateway, telephoneClient, type TelephoneGateway } from './telephone-gateway.ts';
import { keyPressSentence, telephoneSentence } from './telephone-wording.ts';

/** Long enough to find a phone in the dark, short enough to end before most voice mail picks up. */
const ringForS = 25;
const waitForKeyS = 6;

/** What is said: the sentence and the key to press, twice, for whoever is just waking up. */
const spokenCall = (kind: NotificationKind, keysUrl: string): string => {
  const spoken = new twilio.twiml.VoiceResponse();
  for (let time = 1; time <= 2; time += 1) {
    spoken
      .gather({ input: ['dtmf'], numDigits: 1, timeout: waitForKeyS, action: keysUrl, method: 'POST' })
      .say(`${telephoneSentence(kind)} ${keyPressSentence}`);
  }
  spoken.hangup();
  return spoken.toString();
};

/** Telephone calls. The address of the hooks holds ids only, and the gateway signs what it sends there. */
export const openTelephone = ({
  gateway,
  publicUrl,
}: {
  gateway: TelephoneGateway;
  publicUrl: string;
}): Channel => {
  const client = telephoneClient(gateway);
  return {
    send: async ({ phone, clinicId, id, kind }) => {
      if (!phone) throw new NotDeliverable('refused');
      const hook = (what: 'keys' | 'status') =>
        new URL(`/gateway/calls/${clinicId}/${id}/${what}`, publicUrl).href;
      return askGateway(() =>
        client.calls.create({
          to: phone,
          from: gateway.from,
          twiml: spokenCall(kind, hook('keys')),
          timeout: ringForS,
          statusCallback: hook('status'),
          statusCallbackMethod: 'POST',
          statusCallbackEvent: ['completed'],
        }),
      );
    },
    close: () => undefined,
  };
};
