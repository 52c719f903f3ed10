import type { Page } from '@playwright/test';

/** Gives this page's browser a place for passkeys that knows its owner at once, as a phone does by a finger. */
export const withPasskeys = async (page: Page) => {
  const cdp = await page.context().newCDPSession(page);
  await cdp.send('WebAuthn.enable');
  const { authenticatorId } = await cdp.send('WebAuthn.addVirtualAuthenticator', {
    options: {
      protocol: 'ctap2',
      transport: 'internal',
      hasResidentKey: true,
      hasUserVerification: true,
      isUserVerified: true,
      automaticPresenceSimulation: true,
    },
  });
  return {
    /** How many passkeys it holds. */
    count: async () => (await cdp.send('WebAuthn.getCredentials', { authenticatorId })).credentials.length,
  };
};
