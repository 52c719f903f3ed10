import Bowser from 'bowser';

/** Systems are known by the names on the devices, as people call them. */
const deviceNames: Record<string, string> = { macOS: 'Mac', 'Chrome OS': 'Chromebook' };
const browserNames: Record<string, string> = { 'Microsoft Edge': 'Edge', Chromium: 'Chrome' };

/** What a browser said of itself, in words: "Safari on iPhone". A guess that helps to tell devices apart. */
export const deviceName = (userAgent: string | null): string => {
  if (!userAgent) return 'Unknown device';
  const { browser, os, platform } = Bowser.parse(userAgent);
  const program = browser.name && (browserNames[browser.name] ?? browser.name);
  // "iPhone" and "iPad" say more than "iOS", which both run.
  const isApple = platform.vendor === 'Apple' && platform.model !== undefined && os.name === 'iOS';
  const device = isApple ? platform.model : os.name && (deviceNames[os.name] ?? os.name);
  if (program && device) return `${program} on ${device}`;
  return program || device || 'Unknown device';
};
