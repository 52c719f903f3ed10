import { afterAll, beforeAll, beforeEach } from 'vitest';
import {
  makeClinic,
  makePatient,
  makePerson,
  type TestPatient,
  type TestPerson,
} from '#tests/support/clinic.ts';
import { cloneDatabase, type TestDatabase } from '#tests/support/database.ts';
import { startWeb, type TestBrowser, type TestWeb } from '#tests/support/web.ts';

type Scene = {
  database: TestDatabase;
  web: TestWeb;
  clinicId: string;
  noor: TestPerson;
  desk: TestBrowser;
  /** One of Noor's, made anew for every test. */
  patient: TestPatient;
};

/** A clinic with Noor at her desk and a patient of hers; call it once at the top of a file. */
export const patientScene = () => {
  const scene = {} as Scene;
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
  });
  const move = (
    name: string,
    changes: Record<string, unknown> = {},
    { patientId }: { patientId: string } = scene.patient,
  ) =>
    scene.desk.call('post', `/api/patients/${patientId}/moves`, {
      move: name,
      reason: 'Said on the phone.',
      ...changes,
    });
  return { scene, move };
};
