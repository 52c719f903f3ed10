import { expect, it } from 'vitest';
import { deviceName } from '#server/features/accounts/devices.ts';

/** What browsers said of themselves, from memory of their usual form. */
const chromeOn = (system: string) =>
  `Mozilla/5.0 (${system}) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/140.0.0.0 Safari/537.36`;

it.each([
  [
    'Mozilla/5.0 (iPhone; CPU iPhone OS 18_5 like Mac OS X) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/18.5 Mobile/15E148 Safari/604.1',
    'Safari on iPhone',
  ],
  [
    'Mozilla/5.0 (iPad; CPU OS 16_6 like Mac OS X) AppleWebKit/605.1.15 (KHTML, like Gecko) Version/16.6 Mobile/15E148 Safari/604.1',
    'Safari on iPad',
  ],
  [chromeOn('Windows NT 10.0; Win64; x64'), 'Chrome on Windows'],
  [chromeOn('Macintosh; Intel Mac OS X 10_15_7'), 'Chrome on Mac'],
  [chromeOn('Linux; Android 10; K').replace(' Safari', ' Mobile Safari'), 'Chrome on Android'],
  [`${chromeOn('Windows NT 10.0; Win64; x64')} Edg/140.0.0.0`, 'Edge on Windows'],
  ['Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0', 'Firefox on Linux'],
  ['', 'Unknown device'],
  [null, 'Unknown device'],
])('names a device by what its browser says: %s', (userAgent, name) => {
  expect(deviceName(userAgent)).toBe(name);
});

it('has words for a browser that says nothing known', () => {
  expect(deviceName('\u0001\u0002 ?')).toBe('Unknown device');
});
