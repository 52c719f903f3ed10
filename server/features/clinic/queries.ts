import { and, eq, sql } from 'drizzle-orm';
import type { ClinicCard } from '#shared/clinic/contract.ts';
import { isOpenAt, nextOpening } from '#shared/clinic/hours.ts';
import { alerts, checkIns } from '../../db/schema/check-ins.ts';
import { clinics } from '../../db/schema/clinics.ts';
import type { Tx } from '../../db/with-tx.ts';

export const clinicOf = async (tx: Tx, clinicId: string) => {
  const rows = await tx.select().from(clinics).where(eq(clinics.id, clinicId));
  const clinic = rows[0];
  if (!clinic) throw new Error('A transaction inside a clinic that is not there.');
  return clinic;
};

export const clinicCardOf = async (tx: Tx, clinicId: string, now: Date): Promise<ClinicCard> => {
  const { openingHours, ...clinic } = await clinicOf(tx, clinicId);
  const openNow = isOpenAt(openingHours, clinic.timeZone, now);
  const opensAt = nextOpening(openingHours, clinic.timeZone, now)?.toISOString() ?? null;
  return { ...clinic, openNow, opensAt };
};

/** The clinic that the sign-in page may greet for: the one of this server, where there is just one. */
export const findOnlyClinicId = async (tx: Tx): Promise<string | null> => {
  const { rows } = await tx.execute<{ id: string | null }>(sql`select only_clinic_id() as id`);
  return rows[0]?.id ?? null;
};

/** Check-ins and alerts of the clinic received before an instant that no rule has seen. */
export const countUnevaluated = async (tx: Tx, clinicId: string, before: Date): Promise<number> => {
  const waiting = (table: typeof checkIns | typeof alerts) =>
    tx.$count(
      table,
      and(
        eq(table.clinicId, clinicId),
        sql`${table.evaluatedAt} is null`,
        sql`${table.receivedAt} < ${before}`,
      ),
    );
  return (await waiting(checkIns)) + (await waiting(alerts));
};
