/** Makes the login roles that serve requests, or says with which statements somebody else can. */
import { createHash, createHmac, pbkdf2Sync, randomBytes } from 'node:crypto';
import type { Client } from 'pg';
import { DATABASE_ROLES, type RoleSettings, roleName } from './role-names.ts';

const SCRAM_ROUNDS = 4096;

/** The user of the address may not make roles; `sql` is what someone who may has to run. */
export class CreateRoleMissing extends Error {
  readonly sql: string;

  constructor(user: string, sql: string) {
    super(`The database user "${user}" may not create roles.`);
    this.name = 'CreateRoleMissing';
    this.sql = sql;
  }
}

/**
 * What PostgreSQL itself keeps of a password (RFC 5802 with SHA-256). Sent instead of the password, so
 * that neither the server's log nor a printed statement holds it.
 */
export function scramVerifier(password: string, salt: Buffer = randomBytes(16)): string {
  const salted = pbkdf2Sync(password.normalize('NFKC'), salt, SCRAM_ROUNDS, 32, 'sha256');
  const hmac = (text: string) => createHmac('sha256', salted).update(text).digest();
  const storedKey = createHash('sha256').update(hmac('Client Key')).digest('base64');
  const serverKey = hmac('Server Key').toString('base64');
  return `SCRAM-SHA-256$${SCRAM_ROUNDS}:${salt.toString('base64')}$${storedKey}:${serverKey}`;
}

/**
 * Creates the roles that are missing and sets the passwords of those that are there.
 *
 * @throws CreateRoleMissing where a role is missing and this user may not make it
 */
export async function ensureRoles(client: Client, settings: RoleSettings): Promise<void> {
  const names = DATABASE_ROLES.map((role) => roleName(settings.rolePrefix, role));
  const held = await client.query<{ rolname: string }>(
    'SELECT rolname FROM pg_roles WHERE rolname = ANY($1)',
    [names],
  );
  const known = new Set(held.rows.map((row) => row.rolname));
  const statements = DATABASE_ROLES.map((role) => {
    const name = roleName(settings.rolePrefix, role);
    const verb = known.has(name) ? 'ALTER' : 'CREATE';
    return `${verb} ROLE ${name} LOGIN PASSWORD '${scramVerifier(settings.passwords[role])}';`;
  });

  const rights = await client.query<{ may: boolean; name: string }>(
    'SELECT rolsuper OR rolcreaterole AS may, rolname AS name FROM pg_roles WHERE rolname = current_user',
  );
  const user = rights.rows[0];
  if (user?.may) {
    await client.query(statements.join('\n'));
    return;
  }
  // Roles made by someone else are taken as they are; a wrong password shows at the first connection.
  if (known.size < names.length) {
    throw new CreateRoleMissing(user?.name ?? 'unknown', statements.join('\n'));
  }
}
