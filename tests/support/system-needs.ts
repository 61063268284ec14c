import { aptInstall, aptLine, canInstall } from '../../database/server/apt.ts';
import { findBinaries, POSTGRES_PACKAGE } from '../../database/server/binaries.ts';
import { findChromium } from './chromium.ts';

/**
 * Installs what the tests need from the system, or says with which one line somebody can.
 * @returns the line to print where something is missing and can't be installed here
 */
export async function ensureSystemPackages(): Promise<string | undefined> {
  const missing = await missingPackages();
  if (missing.length === 0) return undefined;
  if (!canInstall()) return aptLine(missing);
  console.log(`Installing ${missing.join(', ')}…`);
  await aptInstall(missing);
  const still = await missingPackages();
  return still.length === 0 ? undefined : aptLine(still);
}

async function missingPackages(): Promise<string[]> {
  const missing: string[] = [];
  const database = process.env.TEST_DATABASE_URL || (await findBinaries(process.env));
  if (!database) missing.push(POSTGRES_PACKAGE);
  // A page without any font of the system has no sign for what our own fonts lack.
  if (findChromium() === undefined) missing.push('chromium', 'fonts-dejavu-core');
  return missing;
}
