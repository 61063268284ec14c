import { join } from 'node:path';
import type { Logger } from 'pino';
import accounts from '../../seeds-demo/accounts.json' with { type: 'json' };
import { startSink } from '../mail/sink.ts';
import { prepareDatabase } from '../prepare-database.ts';
import { platformWords } from '../words/platform.ts';
import { buildWeb } from './build-web.ts';
import { runOrExplain } from './failure.ts';
import { type Installation, openInstallation } from './installation.ts';
import { openLog, openLogFile } from './open-log.ts';
import { runServer } from './run-server.ts';
import { seedDemoOnce } from './seed-demo.ts';
import { stopOnSignal } from './stop-on-signal.ts';

/** `npm start`: database, schema, pages, demo once, server; then the address and the demo's accounts. */
export async function main(root: string): Promise<void> {
  await runOrExplain(() => start(root));
}

async function start(root: string): Promise<void> {
  const closers: (() => Promise<void>)[] = [];
  const stop = async () => {
    // What came last goes first: the server before the database it reads.
    for (const close of closers.splice(0).reverse()) await close();
  };
  stopOnSignal(stop);
  try {
    const installation = await openInstallation(root, process.env, makeReady);
    closers.push(installation.close);
    const webRoot = await buildWeb(root, () => console.log(platformWords.building));
    const sink = installation.config.demo
      ? await startSink(join(installation.dataFolder, 'letters'), () => new Date())
      : undefined;
    if (sink) closers.push(sink.close);
    const server = await runServer(installation, { webRoot, logger: logOf(installation), sink });
    closers.push(server.stop);
    announce(installation, server.address);
    if (await installation.databaseEnded) {
      console.error(platformWords.databaseGone);
      await stop();
      process.exit(1);
    }
  } catch (error) {
    await stop();
    throw error;
  }
}

/** Runs under the start lock: two starts never migrate or seed one database at once. */
async function makeReady(installation: Installation): Promise<void> {
  if (installation.config.demo) {
    await seedDemoOnce(installation, logOf(installation), () => console.log(platformWords.seeding));
  }
  await prepareDatabase(installation.ownerUrl, installation.roles);
}

/** With a private database a person sits at the terminal; else standard output is what gathers logs. */
function logOf({ config, dataFolder, privateUrlFor }: Installation): Logger {
  return privateUrlFor ? openLogFile(config, dataFolder) : openLog(config);
}

function announce(installation: Installation, address: string): void {
  const seconds = process.uptime().toFixed(1);
  console.log(platformWords.ready(address, seconds));
  if (installation.config.demo) {
    console.log(`\n${platformWords.accountsLead}`);
    for (const { role, email, password } of accounts) {
      console.log(platformWords.account(role, email, password));
    }
    console.log(`\n${platformWords.letters(`${address}/demo/letters`)}`);
  }
  console.log(platformWords.stopHint);
}
