import { resolve } from 'node:path';
import { platformWords } from '../words/platform.ts';
import { runOrExplain } from './failure.ts';
import { openInstallation } from './installation.ts';
import { openLog } from './open-log.ts';
import { openServices } from './services.ts';
import { stopOnSignal } from './stop-on-signal.ts';

/** `npm run worker`: takes long work from the queue and serves nobody; run it on as many machines as wanted. */
await runOrExplain(async () => {
  if (!process.env.DATABASE_URL) {
    console.error(platformWords.databaseNeeded);
    process.exit(2);
  }
  const installation = await openInstallation(resolve(import.meta.dirname, '../..'), process.env);
  const services = await openServices(installation, { logger: openLog(installation.config) });
  await services.work();
  stopOnSignal(services.close);
  console.log(platformWords.working);
});
