import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { NotificationSettings } from '#shared/notifications/contract.ts';
import { makeClinic, makePatient, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { addDevice, change, rowsOf, tell } from './outgoing.ts';

let database: TestDatabase;
let web: TestWeb;
let clinicId: string;
let noor: TestPerson;
let desk: TestBrowser;

beforeAll(async () => {
  database = await cloneDatabase();
  web = await startWeb(database);
  clinicId = await makeClinic(database);
});

afterAll(async () => {
  await web.stop();
  await database.drop();
});

beforeEach(async () => {
  noor = await makePerson(database, clinicId, ['therapist']);
  desk = await web.signIn(noor);
});

const path = '/api/notification-settings';
const unchanged = {
  choices: [],
  phone: null,
  timeZone: 'America/New_York',
  quietFrom: null,
  quietUntil: null,
  remindAt: null,
};
const settings = async (browser = desk) => (await browser.call('get', path)).body as NotificationSettings;
const put = (body: object, browser = desk) => browser.call('put', path, { ...unchanged, ...body });
const refused = async (body: object, browser = desk) => {
  const { status, body: answer } = await put(body, browser);
  expect(status).toBe(422);
  return (answer as { errors: { field: string; message: string }[] }).errors;
};
const off = (kind: string, ...channels: string[]) =>
  channels.map((channel) => ({ kind, channel, enabled: false }));
const channelsTold = async (kind: 'new-emergency' | 'new-urgent' | 'new-message', path: string) => {
  await tell(database, noor, { kind, path }, new Date());
  return (await rowsOf(database, noor))
    .filter((row) => row.kind === kind)
    .map(({ channel }) => channel)
    .sort();
};

describe('what somebody is asked about', () => {
  it('are the kinds of their roles on every channel, as they are by default', async () => {
    const { choices, ...rest } = await settings();
    expect(new Set(choices.map(({ kind }) => kind))).toEqual(
      new Set(['new-emergency', 'new-urgent', 'new-flag', 'new-message']),
    );
    expect(choices).toHaveLength(16);
    expect(choices.filter(({ enabled }) => enabled).map(({ kind, channel }) => `${kind} ${channel}`)).toEqual(
      [
        'new-emergency push',
        'new-emergency email',
        'new-emergency sms',
        'new-emergency phone',
        'new-urgent push',
        'new-urgent email',
        'new-urgent sms',
        'new-flag push',
        'new-flag email',
        'new-message push',
        'new-message email',
      ],
    );
    expect(rest).toEqual({
      missing: ['phone', 'push'],
      phone: null,
      email: noor.email,
      emailBounced: false,
      timeZone: 'America/New_York',
      quietFrom: null,
      quietUntil: null,
      remindAt: null,
    });
  });

  it('are a patient’s messages and reminders, with the zone of the record; nothing is missing, for nothing pages', async () => {
    const patient = await makePatient(database, clinicId, { patient: { timeZone: 'America/Denver' } });
    const { choices, timeZone, missing } = await settings(await web.signIn(patient));
    expect(new Set(choices.map(({ kind }) => kind))).toEqual(new Set(['new-message', 'check-in-reminder']));
    expect([timeZone, missing]).toEqual(['America/Denver', []]);
  });

  it('is nothing for the administrator, who is told of nothing by choice', async () => {
    const admin = await makePerson(database, clinicId, ['administrator']);
    expect((await settings(await web.signIn(admin))).choices).toEqual([]);
  });
});

describe('a change', () => {
  it('is kept, and decides on what channels the next one goes out', async () => {
    await addDevice(database, noor);
    const choices = [...off('new-message', 'email'), { kind: 'new-message', channel: 'sms', enabled: true }];
    const { status, body } = await put({
      choices,
      phone: '(518) 555-0123',
      timeZone: 'Europe/Berlin',
      quietFrom: '21:00',
      quietUntil: '07:00',
    });
    expect(status).toBe(200);
    expect(body).toMatchObject({
      phone: '+15185550123',
      timeZone: 'Europe/Berlin',
      quietFrom: '21:00',
      quietUntil: '07:00',
      missing: [],
    });
    expect(body).toEqual(await settings());
    expect(await channelsTold('new-message', '/messages/1')).toEqual(['push', 'sms']);
  });

  it('leaves what it does not name as it was', async () => {
    await put({ choices: off('new-flag', 'email') });
    await put({ choices: off('new-message', 'push') });
    const disabled = (await settings()).choices.filter(
      ({ kind, channel, enabled }) =>
        !enabled && (channel === 'email' || channel === 'push') && kind !== 'test',
    );
    expect(disabled.map(({ kind, channel }) => `${kind} ${channel}`)).toEqual([
      'new-flag email',
      'new-message push',
    ]);
  });

  it('never leaves a page without a channel that wakes: the last one is locked, and refused with a sentence', async () => {
    await put({ choices: off('new-urgent', 'push', 'email') });
    const urgent = async () => (await settings()).choices.filter(({ kind }) => kind === 'new-urgent');
    expect((await urgent()).filter(({ locked }) => locked).map(({ channel }) => channel)).toEqual(['sms']);
    const errors = await refused({
      choices: off('new-urgent', 'sms'),
      quietFrom: '20:00',
      quietUntil: '06:00',
    });
    expect(errors).toEqual([
      {
        field: 'choices.0',
        message:
          'Leave push, SMS or the telephone call on here: an e-mail wakes nobody, and this must reach you.',
      },
    ]);
    // Nothing of a refused form is kept.
    expect((await urgent()).find(({ channel }) => channel === 'sms')).toMatchObject({ enabled: true });
    expect((await settings()).quietFrom).toBeNull();
  });

  it.each<[string, object, string]>([
    ['a telephone number that is none', { phone: '12' }, 'phone'],
    ['words for a telephone number', { phone: 'call my wife' }, 'phone'],
    ['a time zone that is none', { timeZone: 'Mars/Olympus' }, 'timeZone'],
    ['a time that is none', { quietFrom: '25:00', quietUntil: '07:00' }, 'quietFrom'],
    ['half of the quiet hours', { quietFrom: '21:00' }, 'quietUntil'],
    ['a kind that nobody chooses', { choices: off('sign-in-changed', 'email') }, 'choices.0'],
    ['a kind of other roles', { choices: off('check-in-reminder', 'email') }, 'choices.0'],
  ])('with %s is refused beside its field, and nothing is kept', async (_what, body, field) => {
    const before = await settings();
    const errors = await refused({ remindAt: '08:00', ...body });
    expect(errors.map((error) => error.field)).toEqual([field]);
    expect(errors[0]!.message).toMatch(/^[A-Z].+\.$/);
    expect(await settings()).toEqual(before);
  });

  it('to the zone that holds anyway follows it from then on', async () => {
    await put({ timeZone: 'America/New_York' });
    await database.asSuperuser.query(`update clinics set time_zone = 'America/Chicago' where id = $1`, [
      clinicId,
    ]);
    expect((await settings()).timeZone).toBe('America/Chicago');
    await database.asSuperuser.query(`update clinics set time_zone = 'America/New_York' where id = $1`, [
      clinicId,
    ]);
  });
});

describe('a page', () => {
  it('takes another way that wakes where the chosen one leads nowhere', async () => {
    await put({ choices: off('new-emergency', 'sms', 'phone', 'email'), phone: '+15185550123' });
    // Only push is on, and there is no device.
    expect(await channelsTold('new-emergency', '/round/1')).toEqual(['phone', 'sms']);
    await addDevice(database, noor);
    await tell(database, noor, { kind: 'new-emergency', path: '/round/2' }, new Date());
    expect((await rowsOf(database, noor)).map(({ channel }) => channel).sort()).toEqual([
      'phone',
      'push',
      'sms',
    ]);
  });

  it('goes by e-mail where nothing else leads anywhere, also when that is off', async () => {
    await put({ choices: off('new-emergency', 'email') });
    expect(await channelsTold('new-emergency', '/round/1')).toEqual(['email']);
  });
});

describe('a test to oneself', () => {
  const test = (channel: string) => desk.call('post', '/api/notification-tests', { channel });

  it('goes out on the channel asked for and on no other', async () => {
    await addDevice(database, noor);
    await change(database, noor, { phone: '+15185550123' });
    expect((await test('sms')).status).toBe(204);
    expect((await test('email')).status).toBe(204);
    expect((await rowsOf(database, noor)).map(({ channel, kind }) => `${kind} ${channel}`)).toEqual([
      'test sms',
      'test email',
    ]);
    const again = await test('sms');
    expect(again.status).toBe(429);
    expect(again.body).toMatchObject({ retryAfter: 300 });
  });

  it('needs a telephone number to ring', async () => {
    const { status, body } = await test('phone');
    expect(status).toBe(422);
    expect(body).toMatchObject({ errors: [{ field: 'channel' }] });
    expect(await rowsOf(database, noor)).toEqual([]);
  });
});
