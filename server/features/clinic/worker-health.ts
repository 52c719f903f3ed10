import type pg from 'pg';

/** A worker writes a sign of life this often; older than `workerLateAfterMs` every clinic screen says so. */
export const heartbeatEveryMs = 5_000;
export const workerLateAfterMs = 30_000;

export const beat = async (gate: pg.Pool, workerId: string, now: Date): Promise<void> => {
  await gate.query(
    `insert into worker_heartbeats (worker_id, beat_at) values ($1, $2)
     on conflict (worker_id) do update set beat_at = excluded.beat_at`,
    [workerId, now],
  );
  await gate.query(`delete from worker_heartbeats where beat_at < $1::timestamptz - interval '1 day'`, [now]);
};

/** The newest sign of life of any worker. */
export const readLastBeat = async (gate: pg.Pool): Promise<Date | null> => {
  const { rows } = await gate.query<{ last: Date | null }>(
    'select max(beat_at) as last from worker_heartbeats',
  );
  return rows[0]?.last ?? null;
};

export const workerHealth = (lastBeatAt: Date | null, now: Date) => ({
  lastBeatAt: lastBeatAt?.toISOString() ?? null,
  late: lastBeatAt === null || now.getTime() - lastBeatAt.getTime() > workerLateAfterMs,
});
