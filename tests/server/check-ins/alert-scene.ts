import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, expect } from 'vitest';
import type { PostAlert } from '#shared/check-ins/contract.ts';
import type { FlagCase, FlagRow, MorningRound } from '#shared/triage/contract.ts';
import { sweepUnevaluated } from '#server/features/check-ins/sweep.ts';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, silentLog, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';
import { alertBody, checkInBody } from './bodies.ts';

type AlertScene = {
  database: TestDatabase;
  web: TestWeb;
  clinicId: string;
  noor: TestPerson;
  desk: TestBrowser;
  /** A new one for each test. */
  patient: TestPatient;
  phone: TestBrowser;
};

/** A clinic with Noor at her desk, and for each test a patient of hers with a phone. */
export const alertScene = () => {
  const scene = {} as AlertScene;
  beforeAll(async () => {
    scene.database = await cloneDatabase();
    scene.web = await startWeb(scene.database);
    scene.clinicId = await makeClinic(scene.database);
    scene.noor = await makePerson(scene.database, scene.clinicId, ['therapist'], 'Noor Haddad');
    scene.desk = await scene.web.signIn(scene.noor);
  });
  afterAll(async () => {
    await scene.web.stop();
    await scene.database.drop();
  });
  beforeEach(async () => {
    scene.patient = await makePatient(scene.database, scene.clinicId, { lead: scene.noor });
    scene.phone = await scene.web.signIn(scene.patient);
  });

  /** Evaluates what is waiting, as if it had waited for the ten seconds that are the worker's. */
  const sweep = async (): Promise<void> => {
    for (const table of ['alerts', 'check_ins']) {
      await scene.database.asSuperuser.query(
        `update ${table} set received_at = received_at - interval '11 seconds' where evaluated_at is null`,
      );
    }
    await sweepUnevaluated(scene.database.pools.app, new Date(), silentLog);
  };
  const flagsOfPatient = async (): Promise<FlagRow[]> =>
    ((await scene.desk.call('get', '/api/flags')).body as MorningRound).flags.filter(
      (flag) => flag.patient.id === scene.patient.patientId,
    );
  const caseOf = async (flagId: string): Promise<FlagCase> =>
    (await scene.desk.call('get', `/api/flags/${flagId}`)).body as FlagCase;
  const send = async (changes: Partial<PostAlert> = {}): Promise<PostAlert> => {
    const body = alertBody(changes);
    const answer = await scene.phone.call('post', '/api/alerts', body);
    expect(answer.status, answer.text).toBe(201);
    return body;
  };
  const finish = async (id: string, changes: Parameters<typeof checkInBody>[0]): Promise<void> => {
    const answer = await scene.phone.call('post', '/api/check-ins', checkInBody({ id, ...changes }));
    expect(answer.status, answer.text).toBe(201);
  };
  const callMistake = (alertId: string) =>
    scene.phone.call('post', `/api/alerts/${alertId}/mistakes`, {
      id: randomUUID(),
      answeredAt: new Date().toISOString(),
    });
  return { scene, sweep, flagsOfPatient, caseOf, send, finish, callMistake };
};
