import { highestUrgency } from '#shared/red-flags/findings.ts';
import type { findings, flagEvents } from '../db/schema/flags.ts';
import type { FlagRecord } from '../features/triage/queries.ts';
import { demoClinicId } from './clinic.ts';
import { flagThreadOf } from './flag-threads.ts';
import type { DemoCheckIn } from './histories.ts';
import { instantAt } from './moments.ts';
import { idOf } from './random.ts';
import type { PatientRecord } from './records.ts';
import type { Handling } from './scenario.ts';
import { staffId } from './staff.ts';
import type { DemoThread } from './threads.ts';

type EventRow = typeof flagEvents.$inferSelect;

type DemoFlag = {
  flag: FlagRecord;
  findings: (typeof findings.$inferSelect)[];
  events: EventRow[];
  thread: DemoThread | null;
};

const handledColumns = (handling: Handling | null, date: string): Partial<FlagRecord> => {
  if (!handling || handling.claimedAt === undefined) return {};
  const { by, claimedAt, closed } = handling;
  const claimed = { claimedBy: staffId(by), claimedAt: instantAt(date, claimedAt) };
  if (!closed) return { ...claimed, state: 'claimed' };
  const { outcome, worthRaising } = closed.resolution;
  return {
    ...claimed,
    state: 'closed',
    closedAt: instantAt(date, closed.at),
    outcome,
    worthRaising,
  };
};

/** What is on record about a flag, in the order in which it happened. */
const eventsOf = (flag: FlagRecord, raisedAt: Date, handling: Handling | null, date: string): EventRow[] => {
  const event = (
    kind: EventRow['kind'],
    at: Date,
    by: string | null,
    detail: string | null,
    note: string | null = null,
  ): EventRow => ({
    clinicId: demoClinicId,
    id: idOf('flag-event', flag.id, kind),
    flagId: flag.id,
    kind,
    at,
    byPersonId: by,
    detail,
    note,
  });
  const events = [event('raised', raisedAt, null, flag.urgency)];
  if (!handling) return events;
  const { by, seenAt, claimedAt, reply, closed } = handling;
  const person = staffId(by);
  events.push(event('seen', instantAt(date, seenAt), person, null));
  if (claimedAt !== undefined) events.push(event('claimed', instantAt(date, claimedAt), person, null));
  if (reply) events.push(event('replied', instantAt(date, reply.at, 20), person, idOf('reply', flag.id)));
  if (closed) {
    const { outcome, note } = closed.resolution;
    events.push(event('closed', instantAt(date, closed.at), person, outcome, note));
  }
  return events;
};

/** The flag of a check-in in which the rules found something, as the product would have raised and kept it. */
export const flagOf = (record: PatientRecord, checkIn: DemoCheckIn): DemoFlag | null => {
  const { row, alert, findings: found, handling } = checkIn;
  const urgency = highestUrgency(found);
  if (!urgency) return null;
  const source = alert ?? row;
  const foundAt = source.evaluatedAt ?? source.receivedAt;
  const flag: FlagRecord = {
    clinicId: demoClinicId,
    id: idOf('flag', row.clientId),
    patientId: row.patientId,
    sourceAuthorId: row.authorId,
    sourceClientId: row.clientId,
    urgency,
    state: 'open',
    raisedAt: source.receivedAt,
    claimedBy: null,
    claimedAt: null,
    closedAt: null,
    outcome: null,
    worthRaising: null,
    ...handledColumns(handling, row.localDate),
  };
  return {
    flag,
    findings: found.map((finding) => ({
      clinicId: demoClinicId,
      id: idOf('finding', flag.id, finding.code),
      flagId: flag.id,
      sourceId: row.id,
      ...finding,
      toldAt: source.receivedAt,
    })),
    events: eventsOf(flag, foundAt, handling, row.localDate),
    thread: handling?.reply ? flagThreadOf(record, flag, handling, row.localDate) : null,
  };
};
