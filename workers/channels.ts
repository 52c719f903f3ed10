import type { WorkerEnv } from '#server/env.ts';
import { NotDeliverable, type Channel } from '#server/notifications/channels.ts';
import type { DeliveryTools } from '#server/notifications/delivery.ts';
import { openEmail } from '#server/notifications/email.ts';
import { openPush } from '#server/notifications/push.ts';
import { openSms } from '#server/notifications/sms.ts';
import type { TelephoneGateway } from '#server/notifications/telephone-gateway.ts';
import { openTelephone } from '#server/notifications/telephone.ts';

/** Where no gateway is set up nothing rings, and what was to ring stays as failed, for the administrator to see. */
const noGateway: Channel = {
  send: () => Promise.reject(new NotDeliverable('refused')),
  close: () => undefined,
};

const gatewayOf = (env: WorkerEnv): TelephoneGateway | null => {
  const { TWILIO_ACCOUNT_SID: accountSid, TWILIO_AUTH_TOKEN: authToken, TWILIO_FROM: from } = env;
  if (!accountSid || !authToken || !from) return null;
  return { accountSid, authToken, from, apiUrl: env.TWILIO_API_URL };
};

/** Every way out of the product, as this worker's environment names it. */
export const openChannels = (env: WorkerEnv): DeliveryTools['channels'] => {
  const publicUrl = env.PUBLIC_URL;
  const gateway = gatewayOf(env);
  return {
    email: openEmail({ smtpUrl: env.SMTP_URL, from: env.MAIL_FROM, publicUrl }),
    push: openPush({
      vapid: {
        publicKey: env.VAPID_PUBLIC_KEY,
        privateKey: env.VAPID_PRIVATE_KEY,
        subject: env.VAPID_SUBJECT,
      },
      fakeUrl: env.PUSH_FAKE_URL,
    }),
    sms: gateway ? openSms({ gateway, publicUrl }) : noGateway,
    phone: gateway ? openTelephone({ gateway, publicUrl }) : noGateway,
  };
};
