import type pg from 'pg';

/** Logs in, owns nothing, cannot pass row security. */
export const appRole = 'espalier_app';
/** Logs in; rights to the tables outside the fence only. */
const gateRole = 'espalier_gate';
/** Cannot log in; owns the functions that look across clinics. */
const finderRole = 'espalier_finder';

const ensureRole = async (client: pg.Client, role: string, password: string | null): Promise<void> => {
  const { rowCount } = await client.query('select 1 from pg_roles where rolname = $1', [role]);
  if (rowCount === 0) await client.query(`create role ${role} nologin nosuperuser nocreatedb nocreaterole`);
  if (password !== null) {
    await client.query(`alter role ${role} login password ${client.escapeLiteral(password)}`);
  }
};

/** Makes the roles that the migrations grant to. Needs a connection with the right to create roles. */
export const ensureRoles = async (
  client: pg.Client,
  passwords: { app: string; gate: string },
): Promise<void> => {
  await ensureRole(client, appRole, passwords.app);
  await ensureRole(client, gateRole, passwords.gate);
  await ensureRole(client, finderRole, null);
  // Giving a function away takes membership in the role that receives it.
  await client.query(`grant ${finderRole} to current_user`);
};
