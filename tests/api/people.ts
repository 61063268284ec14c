/** Accounts for tests, with one password hashed once: argon2id is slow on purpose. */
import { hashPassword } from '../../api/auth/passwords.ts';
import type { StudyRole } from '../../api/contracts/common.ts';
import type { TestDatabase } from '../support/test-database.ts';

export const PASSWORD = 'thistle and tide 71';
let hashed: Promise<string> | undefined;

export interface TestPerson {
  id: string;
  uid: string;
  email: string;
  name: string;
}

export async function makePerson(
  database: TestDatabase,
  name: string,
  options: { administrator?: boolean; mustChangePassword?: boolean } = {},
): Promise<TestPerson> {
  hashed ??= hashPassword(PASSWORD);
  const email = `${name
    .toLowerCase()
    .match(/[a-z]+/g)
    ?.join('.')}@people.example`;
  const [row] = await database.query<{ id: string; uid: string }>(
    `INSERT INTO account (email, name, password_hash, administrator, must_change_password, created_at)
     VALUES ($1, $2, $3, $4, $5, '2026-01-01') RETURNING id, uid`,
    [
      email,
      name,
      await hashed,
      options.administrator ?? false,
      options.mustChangePassword ?? false,
    ],
  );
  if (!row) throw new Error(`no account for ${name}`);
  return { ...row, email, name };
}

/** A duty written as the owner of the database; a coordinator gets the first site. */
export async function giveRole(
  database: TestDatabase,
  studyId: string,
  person: TestPerson,
  role: StudyRole,
): Promise<void> {
  await database.query(
    `WITH m AS (INSERT INTO membership (study_id, account_id, role, created_at)
                VALUES ($1, $2, $3, '2026-01-01') RETURNING id)
     INSERT INTO membership_site (membership_id, site_id)
     SELECT m.id, (SELECT min(s.id) FROM site s WHERE s.study_id = $1) FROM m WHERE $3 = 'coordinator'`,
    [studyId, person.id, role],
  );
}
