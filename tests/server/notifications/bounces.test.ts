import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { noteBounce } from '#server/notifications/bounces.ts';
import { readDeliveryStatus } from '#server/notifications/delivery-status.ts';
import { makeClinic, makePerson, type TestPerson } from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { rowsOf, tell } from './outgoing.ts';

/**
 * The examples "Simple DSN" and "Multi-Recipient DSN" of RFC 3464's appendix of examples, with the returned mail,
 * which the RFC leaves out, given a head of ours. The boundaries and the reports are the RFC's, but for the
 * addresses, which end in .example here.
 */
const simple = (messageId: string, { recipient = 'louisl@larry.slip.umd.example', status = '4.0.0' } = {}) =>
  `Date: Thu, 7 Jul 1994 17:16:05 -0400
From: Mail Delivery Subsystem <MAILER-DAEMON@CS.UTK.EDU>
Message-Id: <199407072116.RAA14128@CS.UTK.EDU>
Subject: Returned mail: Cannot send message for 5 days
To: <owner-info-mime@cs.utk.example>
MIME-Version: 1.0
Content-Type: multipart/report; report-type=delivery-status;
      boundary="RAA14128.773615765/CS.UTK.EDU"

--RAA14128.773615765/CS.UTK.EDU

The original message was received at Sat, 2 Jul 1994 17:10:28 -0400
from root@localhost

   ----- The following addresses had delivery problems -----
<${recipient}>  (unrecoverable error)

--RAA14128.773615765/CS.UTK.EDU
content-type: message/delivery-status

Reporting-MTA: dns; cs.utk.example

Original-Recipient: rfc822;${recipient}
Final-Recipient: rfc822;${recipient}
Action: failed
Status: ${status}
Diagnostic-Code: smtp; 426 connection timed out
Last-Attempt-Date: Thu, 7 Jul 1994 17:15:49 -0400

--RAA14128.773615765/CS.UTK.EDU
content-type: message/rfc822

From: Espalier <no-reply@espalier.example>
Message-ID: <${messageId}>
Subject: Espalier: a message is waiting

The body of the mail that came back.
--RAA14128.773615765/CS.UTK.EDU--
`;

const multiple = `Content-Type: multipart/report; report-type=delivery-status; boundary="JAA13167.773673707/CS.UTK.EDU"

--JAA13167.773673707/CS.UTK.EDU
content-type: text/plain; charset=us-ascii

   ----- The following addresses had delivery problems -----

--JAA13167.773673707/CS.UTK.EDU
content-type: message/delivery-status

Reporting-MTA: dns; cs.utk.example

Original-Recipient: rfc822;arathib@vnet.ibm.example
Final-Recipient: rfc822;arathib@vnet.ibm.example
Action: failed
Status: 5.0.0 (permanent failure)
Diagnostic-Code: smtp;  550 'arathib@vnet.IBM.COM' is not a
 registered gateway user
Remote-MTA: dns; vnet.ibm.example

Original-Recipient: rfc822;johnh@hpnjld.njd.hp.example
Final-Recipient: rfc822;johnh@hpnjld.njd.hp.example
Action: delayed
Status: 4.0.0 (hpnjld.njd.jp.com: host name lookup failure)

Original-Recipient: rfc822;wsnell@sdcc13.ucsd.example
Final-Recipient: rfc822;wsnell@sdcc13.ucsd.example
Action: failed
Status: 5.0.0
Diagnostic-Code: smtp; 550 user unknown
Remote-MTA: dns; sdcc13.ucsd.example

--JAA13167.773673707/CS.UTK.EDU
content-type: text/rfc822-headers

Message-ID: <one@espalier.example>
--JAA13167.773673707/CS.UTK.EDU--
`;

describe('a report of a mail that came back', () => {
  it('is read as the examples of RFC 3464 are', () => {
    const louis = ['louisl@larry.slip.umd.example', 'louisl@larry.slip.umd.example'];
    const expected = {
      messageId: 'one@espalier.example',
      failed: [{ addresses: louis, isPermanent: false }],
    };
    expect(readDeliveryStatus(simple('one@espalier.example'))).toEqual(expected);
    expect(readDeliveryStatus(simple('one@espalier.example').replaceAll('\n', '\r\n'))).toEqual(expected);
    expect(readDeliveryStatus(multiple)).toEqual({
      messageId: 'one@espalier.example',
      failed: [
        { addresses: ['arathib@vnet.ibm.example', 'arathib@vnet.ibm.example'], isPermanent: true },
        { addresses: ['wsnell@sdcc13.ucsd.example', 'wsnell@sdcc13.ucsd.example'], isPermanent: true },
      ],
    });
  });

  it.each([
    ['is an ordinary mail', 'Subject: Hello\n\nHello.\n'],
    ['is empty', ''],
    [
      'says that the mail is only late',
      simple('one@espalier.example').replace('Action: failed', 'Action: delayed'),
    ],
    ['returns nothing', simple('one@espalier.example').replace('message/rfc822', 'text/plain')],
    ['names no boundary', simple('one@espalier.example').replace(/boundary=".*"/, '')],
  ])('is none when it %s', (_what, text) => {
    expect(readDeliveryStatus(text)).toBeNull();
  });
});

describe('a mail that came back', () => {
  let database: TestDatabase;
  let noor: TestPerson;
  const now = new Date('2026-12-01T15:00:00Z');

  beforeAll(async () => {
    database = await cloneDatabase();
  });
  afterAll(() => database.drop());
  beforeEach(async () => {
    // Another clinic, whose rows the report is not about.
    await makeClinic(database);
    noor = await makePerson(database, await makeClinic(database), ['therapist']);
  });

  const sentMail = async (): Promise<string> => {
    const [id] = await tell(database, noor, { kind: 'new-message' }, now);
    await database.asSuperuser.query(
      `update notifications set state = 'sent', sent_at = now() where id = $1`,
      [id],
    );
    return id!;
  };
  const bounced = async () => {
    const { rows } = await database.asSuperuser.query<{ at: Date | null }>(
      'select email_bounced_at as at from people where id = $1',
      [noor.personId],
    );
    return rows[0]!.at;
  };

  it('is marked, and its address where it refuses for good', async () => {
    const id = await sentMail();
    const report = simple(`${id}@espalier.example`, { recipient: noor.email.toUpperCase(), status: '5.1.1' });
    expect(await noteBounce(database.pools.app, report, now)).toBe(true);
    expect(await rowsOf(database, noor)).toMatchObject([{ id, state: 'bounced', outcome: 'came-back' }]);
    expect(await bounced()).toEqual(now);
    expect(await noteBounce(database.pools.app, report, now)).toBe(false);
  });

  it('after days of trying is marked, and its address is not', async () => {
    const id = await sentMail();
    const report = simple(`${id}@espalier.example`, { recipient: noor.email });
    expect(await noteBounce(database.pools.app, report, now)).toBe(true);
    expect(await rowsOf(database, noor)).toMatchObject([{ state: 'bounced' }]);
    expect(await bounced()).toBeNull();
  });

  it('says nothing of an address that is no longer this person’s', async () => {
    const id = await sentMail();
    const report = simple(`${id}@espalier.example`, { recipient: 'former@people.example', status: '5.1.1' });
    expect(await noteBounce(database.pools.app, report, now)).toBe(true);
    expect(await bounced()).toBeNull();
  });

  it.each([
    ['that was never sent', async () => `${randomUUID()}@espalier.example`],
    ['of somebody else', async () => `${await sentMail()}@elsewhere.example`],
    ['whose id is none', async () => "' or true --@espalier.example"],
    [
      'that still waits',
      async () =>
        `${(await tell(database, noor, { kind: 'new-message', path: '/waits' }, now))[0]}@espalier.example`,
    ],
  ])('changes nothing when it is one %s', async (_what, messageId) => {
    const report = simple(await messageId(), { recipient: noor.email, status: '5.1.1' });
    const before = await rowsOf(database, noor);
    expect(await noteBounce(database.pools.app, report, now)).toBe(false);
    expect(await rowsOf(database, noor)).toEqual(before);
    expect(await bounced()).toBeNull();
  });
});
