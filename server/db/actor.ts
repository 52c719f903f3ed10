import type { Role } from '#shared/access/permissions.ts';

/** Who acts. Every transaction knows it, and row security reads its clinic. */
export type Actor = PersonActor | LinkActor | SystemActor | AnonymousActor;

export type PersonActor = {
  kind: 'person';
  clinicId: string;
  personId: string;
  roles: Role[];
  /** Present when this person is a patient. */
  patientId: string | null;
};

/** Someone who holds a one-time link and no account. */
export type LinkActor = { kind: 'link'; clinicId: string; linkId: string };

/** The system acting for one clinic: jobs, sweeps, timed work. */
export type SystemActor = { kind: 'system'; clinicId: string };

/** Nobody known: sees no clinic's rows. */
export type AnonymousActor = { kind: 'anonymous' };

/** An actor before its person's roles are read from the clinic's own rows. */
export type ActingAs = Omit<PersonActor, 'roles' | 'patientId'> | LinkActor | SystemActor | AnonymousActor;
