import { afterAll, beforeAll, expect, test } from 'vitest';
import { demoAccounts } from '#server/demo/accounts.ts';
import { demoClinicId } from '#server/demo/clinic.ts';
import { loadPersonActor } from '#server/features/accounts/queries.ts';
import { checkPassword } from '#server/features/accounts/service.ts';
import { withTx } from '#server/db/with-tx.ts';
import { outcomeNeeds, type Outcome } from '#shared/triage/lifecycle.ts';
import { demoDatabase, rowsOf, type DemoDatabase } from './demo.ts';

/** A Tuesday, 10:50 in the clinic. */
const now = new Date('2026-12-01T15:50:00Z');
let demo: DemoDatabase;

const query = async <Row extends object>(text: string): Promise<Row[]> =>
  (await demo.asSuperuser.query<Row>(text)).rows;

beforeAll(async () => {
  demo = await demoDatabase();
  await demo.act('fill', now);
});

afterAll(() => demo.drop());

test('the demo holds fifty patients between day 1 and day 120 and one before surgery, each with operation card, plan and a lead therapist', async () => {
  const patients = await query<{ day: number; plan: string; leads: number; role: string; reverse: boolean }>(`
    select date '2026-12-01' - o.surgery_date as day, p.protocol_code as plan, r.role,
      o.procedure = 'reverse-replacement' as reverse,
      (select count(*)::int from care_team_members c where c.patient_id = a.id and c.is_lead) as leads
    from patients a join operation_cards o on o.patient_id = a.id join plans p on p.patient_id = a.id
    join person_roles r on r.person_id = a.person_id`);
  expect(patients).toHaveLength(51);
  expect(patients.filter(({ day }) => day < 1)).toHaveLength(1);
  for (const patient of patients) {
    expect(patient.day).toBeGreaterThanOrEqual(-6);
    expect(patient.day).toBeLessThanOrEqual(120);
    expect(patient).toMatchObject({ plan: 'reverse-replacement', leads: 1, role: 'patient', reverse: true });
  }
});

test('ages lie between 58 and 86, both arms and every answer about blood thinners occur', async () => {
  const [facts] = await query<{
    youngest: number;
    oldest: number;
    arms: number;
    unknown: number;
    none: number;
    named: number;
  }>(`
    select min(extract(year from age(date '2026-12-01', birth_date)))::int as youngest,
      max(extract(year from age(date '2026-12-01', birth_date)))::int as oldest,
      count(distinct arm)::int as arms,
      count(*) filter (where blood_thinner is null)::int as unknown,
      count(*) filter (where blood_thinner = 'none')::int as none,
      count(*) filter (where blood_thinner <> 'none')::int as named
    from patients a join operation_cards o on o.patient_id = a.id`);
  expect(facts!.youngest).toBe(58);
  expect(facts!.oldest).toBe(86);
  expect(facts!.arms).toBe(2);
  expect(Math.min(facts!.unknown, facts!.none, facts!.named)).toBeGreaterThan(2);
});

test('everybody on the printed list can sign in and has a role', async () => {
  expect(demoAccounts).toHaveLength(18);
  for (const { who, email, password } of demoAccounts) {
    expect([...password].length).toBeGreaterThanOrEqual(15);
    const person = await checkPassword(demo.pools.gate, { email, password }, now);
    expect(person, who).not.toBeNull();
    const actor = await withTx(demo.pools.app, { kind: 'person', ...person! }, (tx) =>
      loadPersonActor(tx, person!),
    );
    expect(actor!.roles.length, who).toBeGreaterThan(0);
  }
});

test('mail addresses and telephone numbers are of the reserved kinds only', async () => {
  const people = await query<{ email: string }>('select email from people');
  const numbers = await query<{ text: string }>(
    `select phone || ' ' || emergency_contact as text from patients union all select phone || ' ' || on_call_number from clinics`,
  );
  expect(people.filter(({ email }) => !email.endsWith('.example'))).toEqual([]);
  expect(new Set(people.map(({ email }) => email)).size).toBe(people.length);
  for (const { text } of numbers) expect(text.match(/555-01\d\d/g)).toHaveLength(2);
});

test('phases are opened and precautions lifted by the lead therapist, no precaution before its earliest week', async () => {
  const wrong = await query(`
    select s.code from sign_offs s join plans p on p.id = s.plan_id
      join operation_cards o on o.patient_id = p.patient_id
      join care_team_members c on c.patient_id = p.patient_id and c.is_lead
      left join lateral jsonb_array_elements(p.content -> 'precautions') as precaution
        on precaution ->> 'code' = s.code and s.kind = 'lift-precaution'
    where s.by_person_id <> c.person_id or s.on_date > date '2026-12-01'
      or s.on_date < o.surgery_date + 7 * coalesce((precaution ->> 'liftEarliestWeek')::int, 0)`);
  expect(wrong).toEqual([]);
  const [signed] = await query<{ phases: number; lifted: number; late: number }>(`
    select count(*) filter (where kind = 'open-phase')::int as phases,
      count(*) filter (where kind = 'lift-precaution')::int as lifted,
      count(*) filter (where code = 'motion' and on_date > surgery_date + 44)::int as late
    from sign_offs s join plans p on p.id = s.plan_id join operation_cards o on o.patient_id = p.patient_id`);
  expect(signed!.phases).toBeGreaterThan(20);
  expect(signed!.lifted).toBeGreaterThan(100);
  expect(signed!.late).toBeGreaterThan(2);
});

test('Ines and Tobias have no check-in today and no open flag, so that they can be tried out', async () => {
  const found = await query<{ name: string; today: number; open: number; usual: number }>(`
    select p.name,
      (select count(*)::int from check_ins c where c.patient_id = a.id and c.local_date = '2026-12-01') as today,
      (select count(*)::int from flags f where f.patient_id = a.id and f.state <> 'closed') as open,
      (select avg((answers ->> 'painNow')::int)::float from
        (select answers from check_ins c where c.patient_id = a.id order by answered_at desc limit 3) last) as usual
    from patients a join people p on p.id = a.person_id
    where p.name in ('Ines Valcourt', 'Tobias Ahlgren') order by p.name`);
  expect(found).toEqual([
    { name: 'Ines Valcourt', today: 0, open: 0, usual: 4 },
    { name: 'Tobias Ahlgren', today: 0, open: 0, usual: 3 },
  ]);
});

test('some patients have been silent for days and one has never checked in', async () => {
  const [silent] = await query<{ days: number; never: number }>(`
    select count(*) filter (where newest < date '2026-11-29')::int as days,
      count(*) filter (where newest is null)::int as never
    from (select (select max(local_date) from check_ins c where c.patient_id = a.id) as newest from patients a) x`);
  expect(silent!.days).toBeGreaterThanOrEqual(4);
  // One never came, the other has not had surgery yet.
  expect(silent!.never).toBe(2);
});

test('closed flags have an outcome with the words it needs, claimed ones a name, open ones neither', async () => {
  const flags = await query<{
    state: string;
    outcome: Outcome | null;
    note: string | null;
    claimed: boolean;
    closed: boolean;
  }>(
    `select state, outcome,
      (select e.note from flag_events e where e.flag_id = flags.id and e.kind = 'closed') as note, claimed_by is not null as claimed, closed_at is not null as closed from flags`,
  );
  for (const { state, outcome, note, claimed, closed } of flags) {
    expect(claimed).toBe(state !== 'open');
    expect(closed).toBe(state === 'closed');
    expect(outcome === null).toBe(state !== 'closed');
    if (outcome && outcomeNeeds[outcome]) expect(note).toBeTruthy();
  }
  expect(flags.filter(({ state }) => state === 'closed').length).toBeGreaterThan(25);
});

test('the events of a flag tell the same story as its row, in order', async () => {
  const wrong = await query(`
    select f.id from flags f
      join flag_events raised on raised.flag_id = f.id and raised.kind = 'raised'
      left join flag_events seen on seen.flag_id = f.id and seen.kind = 'seen'
      left join flag_events claimed on claimed.flag_id = f.id and claimed.kind = 'claimed'
      left join flag_events closed on closed.flag_id = f.id and closed.kind = 'closed'
    where raised.at < f.raised_at or seen.at < raised.at or claimed.at < seen.at or closed.at < claimed.at
      or claimed.at is distinct from f.claimed_at or claimed.by_person_id is distinct from f.claimed_by
      or closed.at is distinct from f.closed_at or closed.detail is distinct from f.outcome
      or raised.detail <> f.urgency`);
  expect(wrong).toEqual([]);
  const [counts] = await query<{ flags: number; raised: number }>(
    `select (select count(*)::int from flags) as flags, (select count(*)::int from flag_events where kind = 'raised') as raised`,
  );
  expect(counts!.raised).toBe(counts!.flags);
});

test('filling tells nobody: no notification that waits and no job', async () => {
  const [told] = await query(
    `select (select count(*)::int from notifications where state = 'pending') as notifications, (select count(*)::int from jobs.job) as jobs,
      (select count(*)::int from check_ins where evaluated_at is null) as unevaluated`,
  );
  expect(told).toEqual({ notifications: 0, jobs: 0, unevaluated: 0 });
});

test('a second fill changes nothing', async () => {
  const before = await rowsOf(demo, demoClinicId);
  await demo.act('fill', new Date('2026-12-09T15:50:00Z'));
  expect(await rowsOf(demo, demoClinicId)).toEqual(before);
});

test('two fills on the same date are the same but for the salts of passwords, whatever the hour', async () => {
  const other = await demoDatabase();
  try {
    await other.act('fill', new Date('2026-12-01T22:05:00Z'));
    const leaveOut = ['password_hash', 'sealed_secret'];
    expect(await rowsOf(other, demoClinicId, leaveOut)).toEqual(await rowsOf(demo, demoClinicId, leaveOut));
  } finally {
    await other.drop();
  }
}, 60_000);

test('a demo filled before breakfast has its morning behind it, in the same order and on the same date', async () => {
  const early = await demoDatabase();
  try {
    // 00:20 in the clinic.
    await early.act('fill', new Date('2026-12-01T05:20:00Z'));
    const { rows } = await early.asSuperuser.query(`
      select (select count(*)::int from check_ins where received_at > '2026-12-01T05:20:00Z') as later,
        (select count(*)::int from check_ins where (answered_at at time zone 'America/New_York')::date <> local_date) as elsewhere,
        (select count(*)::int from messages where sent_at > '2026-12-01T05:20:00Z') as messages,
        (select count(*)::int from flags where state <> 'closed') as open`);
    expect(rows).toEqual([{ later: 0, elsewhere: 0, messages: 0, open: 11 }]);
    const order = `select p.name from check_ins c join people p on p.id = c.author_id
      where c.local_date = '2026-12-01' order by c.answered_at, p.name`;
    expect((await early.asSuperuser.query(order)).rows).toEqual(await query(order));
  } finally {
    await early.drop();
  }
}, 60_000);

test('where one row cannot be written, nothing is', async () => {
  const other = await demoDatabase();
  try {
    await other.asSuperuser.query(
      `insert into credentials (person_id, clinic_id, email, password_hash)
       values (gen_random_uuid(), gen_random_uuid(), 'ines@valcourt.example', 'x')`,
    );
    await expect(other.act('fill', now)).rejects.toThrow();
    const { rows } = await other.asSuperuser.query(
      'select (select count(*)::int from clinics) as clinics, (select count(*)::int from people) as people',
    );
    expect(rows).toEqual([{ clinics: 0, people: 0 }]);
  } finally {
    await other.drop();
  }
}, 60_000);
