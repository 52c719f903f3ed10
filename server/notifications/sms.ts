import { NotDeliverable, type Channel } from './channels.ts';
import { askGateway, telephoneClient, type TelephoneGateway } from './telephone-gateway.ts';
import { telephoneSentence } from './telephone-wording.ts';

/** One SMS: the neutral sentence and the way to the sign-in page. */
export const openSms = ({
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
      return askGateway(() =>
        client.messages.create({
          to: phone,
          from: gateway.from,
          body: `${telephoneSentence(kind)} ${new URL('/sign-in', publicUrl).href}`,
          statusCallback: new URL(`/gateway/messages/${clinicId}/${id}/status`, publicUrl).href,
        }),
      );
    },
    close: () => undefined,
  };
};
