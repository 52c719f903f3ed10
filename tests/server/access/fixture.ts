import type { Role } from '#shared/access/permissions.ts';
import type { TestPatient, TestPerson } from '#tests/support/clinic.ts';
import type { TestDatabase } from '#tests/support/database.ts';
import type { Relation } from './scene.ts';

export type Request = {
  id?: string;
  /** What else stands in the address, by the names of the parameters. */
  also?: Record<string, string>;
  body?: unknown;
};

export type RouteFixture = {
  /**
   * Makes a row of the owner and the request for it, anew for every call. `worker` is a clinician there; `author`
   * is who acts for the owner: a caregiver for whom they look after, else the owner. `origin` is the web's own.
   */
  request: (
    database: TestDatabase,
    cast: { actor: TestPerson; owner: TestPatient; worker: TestPerson; author: TestPerson; origin: string },
  ) => Promise<Request>;
  /** The parameter that names the row; without one, the route is about no row but the asker's own. */
  param?: string;
  /** The door of the row: whether one who holds the permission sees it. */
  door?: (role: Role, relation: Relation) => boolean;
  /** Rows that the use case opens only once a reason was given: 403, which is no denial. */
  asksReason?: (role: Role, relation: Relation) => boolean;
  /** Holders of the permission whom the use case refuses all the same. */
  refuses?: (role: Role) => boolean;
  /** The body's id is made by the client: an id that somebody else used already is nobody's business. */
  clientIds?: true;
  /** Whose rows a list shows, by the ids of their patients. */
  patientsIn?: (body: unknown) => string[];
  /** What a public route writes once it knows who it is, beside its declaration of none. */
  writes?: string | readonly string[];
  /** The session is over afterwards: sign in anew. */
  endsSession?: true;
};

export const ownOnly = (_role: Role, relation: Relation) => relation === 'own';
export const wholeClinic = (_role: Role, relation: Relation) => relation !== "other clinic's";

export const nothing = async (): Promise<Request> => ({});
