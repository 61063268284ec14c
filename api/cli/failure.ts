import { CreateRoleMissing } from '../../database/migrate.ts';
import { ClusterProblem } from '../../database/server/cluster-problem.ts';
import { ConfigProblem } from '../config.ts';
import { SecretProblem } from '../secrets.ts';
import { clusterSentence, faultSentence, platformWords } from '../words/platform.ts';

/** Codes of node and PostgreSQL that mean: no connection to the database that was named. */
const UNREACHABLE = [
  'ECONNREFUSED',
  'ENOTFOUND',
  'ETIMEDOUT',
  'EHOSTUNREACH',
  '28P01',
  '28000',
  '3D000',
];

/** What a person reads about an error of starting; undefined for one nobody expected. */
export function failureText(error: unknown): string | undefined {
  if (error instanceof ConfigProblem) return error.faults.map(faultSentence).join('\n');
  if (error instanceof ClusterProblem) return clusterSentence(error.code, error.params);
  if (error instanceof SecretProblem) return platformWords.secretUnreadable(error.place);
  if (error instanceof CreateRoleMissing) {
    return `${error.message} ${platformWords.rolesMissing}\n\n${error.sql}\n`;
  }
  if (error instanceof AggregateError && error.errors.length > 0)
    return failureText(error.errors[0]);
  const { code, syscall, port, address } = error as NodeJS.ErrnoException & {
    port?: number;
    address?: string;
  };
  if (syscall === 'listen') {
    if (code === 'EADDRINUSE') return platformWords.portTaken(port ?? 0);
    return platformWords.addressUnusable(address ?? '', code ?? '');
  }
  if (code !== undefined && UNREACHABLE.includes(code)) {
    return platformWords.databaseUnreachable((error as Error).message || code);
  }
  return undefined;
}

/**
 * Runs a command to its end. What can be mended is said in words and exits 2; anything else shows where it
 * happened and exits 1.
 */
export async function runOrExplain(run: () => Promise<void>): Promise<void> {
  try {
    await run();
  } catch (error) {
    const text = failureText(error);
    console.error(text === undefined ? error : `${platformWords.refused}\n${text}`);
    process.exit(text === undefined ? 1 : 2);
  }
}
