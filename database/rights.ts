/** Who may do what with which table. Anything not written here is refused by PostgreSQL. */
import type { QueryRunner } from 'typeorm';
import { DATABASE_ROLES, roleName } from './role-names.ts';

const READ = 'SELECT';
const APPEND = 'SELECT, INSERT';
const EDIT = 'SELECT, INSERT, UPDATE';
/** Rows that carry no record of the study and are cleared away: sessions, counters, answers kept for a day. */
const CLEAR = 'SELECT, INSERT, UPDATE, DELETE';

export const RECORD_RIGHTS: Record<string, string> = {
  account: EDIT,
  session: CLEAR,
  refresh_token: CLEAR,
  rate_counter: CLEAR,
  idempotency: CLEAR,
  letter: EDIT,
  study: EDIT,
  site: EDIT,
  arm: EDIT,
  measure: EDIT,
  planned_visit: EDIT,
  membership: EDIT,
  membership_site: CLEAR,
  subject: EDIT,
  visit: EDIT,
  reading: EDIT,
  reading_revision: APPEND,
  applied_row: APPEND,
  import: EDIT,
  import_refusal: CLEAR,
  import_implausible: CLEAR,
  job: EDIT,
  cut: APPEND,
  cut_chunk: APPEND,
  specification: APPEND,
  check_opening: APPEND,
  acknowledgement: APPEND,
  analysis_record: APPEND,
  signature: APPEND,
  open_arm: APPEND,
};

/**
 * Grants the rights above, and takes away all others. Run at every migration: grants on a schema and its
 * tables are part of the database, but the roles belong to the server, and another prefix means others.
 */
export async function grantRights(runner: QueryRunner, rolePrefix: string): Promise<void> {
  for (const role of DATABASE_ROLES) {
    const name = roleName(rolePrefix, role);
    for (const schema of ['public', 'audit', 'sealed', 'released']) {
      await runner.query(`REVOKE ALL ON ALL TABLES IN SCHEMA ${schema} FROM ${name}`);
      await runner.query(`REVOKE ALL ON SCHEMA ${schema} FROM ${name}`);
    }
    await runner.query(`GRANT USAGE ON SCHEMA public, audit TO ${name}`);
    for (const [table, verbs] of Object.entries(RECORD_RIGHTS)) {
      await runner.query(`GRANT ${verbs} ON public.${table} TO ${name}`);
    }
    await runner.query(`GRANT ${READ} ON audit.chain, audit.entry TO ${name}`);
    await runner.query(`GRANT EXECUTE ON FUNCTION audit.append(text, text) TO ${name}`);
  }

  const open = roleName(rolePrefix, 'open');
  const board = roleName(rolePrefix, 'board');
  await runner.query(`GRANT USAGE ON SCHEMA sealed, released TO ${open}`);
  await runner.query(`GRANT ${APPEND} ON sealed.allocation, sealed.code_key TO ${open}`);
  // What is released is prepared by one role and read by the other; a table made later obeys at once.
  await runner.query(`GRANT USAGE ON SCHEMA released TO ${board}`);
  await runner.query(`GRANT ${APPEND} ON ALL TABLES IN SCHEMA released TO ${open}`);
  await runner.query(`GRANT ${READ} ON ALL TABLES IN SCHEMA released TO ${board}`);
  await runner.query(
    `ALTER DEFAULT PRIVILEGES IN SCHEMA released GRANT ${APPEND} ON TABLES TO ${open}`,
  );
  await runner.query(
    `ALTER DEFAULT PRIVILEGES IN SCHEMA released GRANT ${READ} ON TABLES TO ${board}`,
  );
}
