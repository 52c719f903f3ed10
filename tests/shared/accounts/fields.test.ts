import { describe, expect, it } from 'vitest';
import { emailField, timeZoneField } from '#shared/accounts/fields.ts';

describe('a time zone', () => {
  it.each(['America/New_York', 'America/Argentina/Buenos_Aires', 'Europe/Paris', 'Etc/GMT+5', 'UTC'])(
    'of the IANA database is taken: %s',
    (zone) => {
      expect(timeZoneField.safeParse(zone).success).toBe(true);
    },
  );

  it.each(['', 'Mars/Olympus', 'New York', '+02:00', 'IST', 'EST5EDT', 'SystemV/AST4', 'america/new_york'])(
    'that is none, or that databases read otherwise, is refused: "%s"',
    (zone) => {
      expect(timeZoneField.safeParse(zone).success).toBe(false);
    },
  );
});

describe('an e-mail address', () => {
  it.each(['ines@valcourt.example', 'o’neill.anne+home@sub.people.example', 'þórunn@síða.example'])(
    'is taken as people have it: %s',
    (address) => {
      expect(emailField.safeParse(address).success).toBe(true);
    },
  );

  // The special characters of RFC 5322, section 3.2.3, with which mail programs write lists and names.
  it.each([
    'x',
    'x@y',
    'a,b@people.example',
    'x<eve@people.example>',
    'all:eve@people.example;',
    'a b@c.example',
  ])('that is none, or more than one, is refused: %s', (address) => {
    expect(emailField.safeParse(address).success).toBe(false);
  });
});
