import type { Role } from '#shared/access/permissions.ts';

/** A person with the roles they hold now. */
export type PersonActor = {
  kind: 'person';
  clinicId: string;
  personId: string;
  roles: Role[];
  /** The patient whose record this request is about: their own, or one they look after. */
  patientId: string | null;
  /** Present where it is not their own: what the patient lets this caregiver do. */
  caring: { caregiverId: string; mayCheckIn: boolean; mayMessage: boolean } | null;
};

/** Someone who holds a one-time link and no account. */
type LinkActor = { kind: 'link'; clinicId: string; linkId: string };

/** The system acting for one clinic: jobs, sweeps, timed work. */
export type SystemActor = { kind: 'system'; clinicId: string };

/** Nobody known: sees no clinic's rows. */
type AnonymousActor = { kind: 'anonymous' };

/**
 * Who a transaction acts as. Every transaction knows it, and row security reads its clinic. A person's roles are
 * read inside, from the clinic's own rows.
 */
export type ActingAs =
  Omit<PersonActor, 'roles' | 'patientId' | 'caring'> | LinkActor | SystemActor | AnonymousActor;
