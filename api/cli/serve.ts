import { resolve } from 'node:path';
import { platformWords } from '../words/platform.ts';
import { buildWeb } from './build-web.ts';
import { runOrExplain } from './failure.ts';
import { openInstallation } from './installation.ts';
import { openLog } from './open-log.ts';
import { runServer } from './run-server.ts';
import { stopOnSignal } from './stop-on-signal.ts';

/** `npm run serve`: one more server over a database that is already migrated, for several processes or machines. */
await runOrExplain(async () => {
  if (!process.env.DATABASE_URL) {
    console.error(platformWords.databaseNeeded);
    process.exit(2);
  }
  const root = resolve(import.meta.dirname, '../..');
  const installation = await openInstallation(root, process.env);
  // While pages are developed, Vite serves them and only the API is wanted from here.
  const webRoot = process.argv.includes('--api-only') ? undefined : await buildWeb(root);
  const server = await runServer(installation, {
    webRoot,
    logger: openLog(installation.config),
  });
  stopOnSignal(server.stop);
  console.log(platformWords.ready(server.address, process.uptime().toFixed(1)));
});
