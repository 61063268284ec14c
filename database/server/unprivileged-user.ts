import { readFileSync, statSync } from 'node:fs';
import { ClusterProblem } from './cluster-problem.ts';

/** The system user a PostgreSQL process runs as. */
export interface SystemUser {
  name: string;
  uid: number;
  gid: number;
}

/**
 * PostgreSQL refuses to run as root. Root's processes therefore hand it to the owner of an existing data
 * folder, else to `postgres`, else to `nobody`; anybody else runs it as themselves (undefined).
 * @throws ClusterProblem `no-unprivileged-user`
 */
export function serverUser(existingFolder?: string): SystemUser | undefined {
  if (process.getuid?.() !== 0) return undefined;
  const users = readUsers();
  if (existingFolder !== undefined) {
    const { uid, gid } = statSync(existingFolder);
    if (uid !== 0) {
      return { name: users.find((user) => user.uid === uid)?.name ?? String(uid), uid, gid };
    }
  }
  for (const name of ['postgres', 'nobody']) {
    const user = users.find((candidate) => candidate.name === name);
    if (user) return user;
  }
  throw new ClusterProblem('no-unprivileged-user');
}

function readUsers(): SystemUser[] {
  return readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .map((line) => line.split(':'))
    .filter((fields) => fields.length >= 4)
    .map((fields) => ({ name: fields[0]!, uid: Number(fields[2]), gid: Number(fields[3]) }));
}

/**
 * The command line that runs a program as that user, and on Linux tells the kernel to interrupt it when
 * this process dies in any way, so that no server is left behind.
 */
export function commandAs(
  user: SystemUser | undefined,
  program: string,
  args: readonly string[],
  endsWithUs: boolean,
): [string, string[]] {
  if (process.platform !== 'linux') return [program, [...args]];
  const privileges: string[] = [];
  if (user) privileges.push(`--reuid=${user.uid}`, `--regid=${user.gid}`, '--clear-groups');
  if (endsWithUs) privileges.push('--pdeathsig=INT');
  if (privileges.length === 0) return [program, [...args]];
  return ['setpriv', [...privileges, '--', program, ...args]];
}
