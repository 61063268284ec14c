import { type ChildProcess, spawn } from 'node:child_process';
import { join } from 'node:path';
import express from 'express';
import { freePort } from '../../database/server/cluster.ts';
import { lettersPage } from '../mail/letters-page.ts';
import { startSink } from '../mail/sink.ts';
import { prepareDatabase } from '../prepare-database.ts';
import { platformWords } from '../words/platform.ts';
import { runOrExplain } from './failure.ts';
import { openInstallation } from './installation.ts';
import { openLog } from './open-log.ts';
import { seedDemoOnce } from './seed-demo.ts';
import { stopOnSignal } from './stop-on-signal.ts';

/**
 * `npm run dev`: one address where the pages reload by Vite, and behind it the API, which starts again when
 * one of its files changes. Database and demo are those of `npm start`.
 */
export async function main(root: string): Promise<void> {
  await runOrExplain(() => develop(root));
}

async function develop(root: string): Promise<void> {
  const closers: (() => Promise<void>)[] = [];
  const stop = async () => {
    for (const close of closers.splice(0).reverse()) await close();
  };
  stopOnSignal(stop);
  try {
    const installation = await openInstallation(root, process.env, async (opened) => {
      if (opened.config.demo)
        await seedDemoOnce(opened, openLog(opened.config), () =>
          console.log(platformWords.seeding),
        );
      await prepareDatabase(opened.ownerUrl, opened.roles);
    });
    closers.push(installation.close);
    const { config, dataFolder, ownerUrl } = installation;
    const sink = await startSink(join(dataFolder, 'letters'), () => new Date());
    closers.push(sink.close);

    const apiPort = await freePort();
    const api = startApi(root, {
      DATABASE_URL: ownerUrl,
      DATA_DIR: dataFolder,
      HOST: '127.0.0.1',
      PORT: String(apiPort),
      PUBLIC_URL: config.publicUrl,
      SMTP_URL: sink.smtpUrl,
      DEMO: 'off',
    });
    closers.push(() => endChild(api));

    process.env.DEV_API_URL = `http://127.0.0.1:${apiPort}`;
    const { createServer } = await import('vite');
    const vite = await createServer({
      configFile: join(root, 'vite.config.ts'),
      server: { host: config.host, port: config.port },
      plugins: [
        {
          name: 'letters of the demo',
          configureServer: (server) => {
            server.middlewares.use(express().use('/demo/letters', lettersPage(sink)));
          },
        },
      ],
    });
    await vite.listen();
    closers.push(() => vite.close());
    console.log(platformWords.ready(config.publicUrl, process.uptime().toFixed(1)));
    console.log(platformWords.stopHint);
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

/** Node's own watch follows what the server imports; it stops the old process and starts a new one. */
function startApi(root: string, env: Record<string, string>): ChildProcess {
  return spawn(
    process.execPath,
    ['--watch', '--watch-preserve-output', '--import', 'tsx', 'api/cli/serve.ts', '--api-only'],
    { cwd: root, env: { ...process.env, ...env }, stdio: ['ignore', 'inherit', 'inherit'] },
  );
}

function endChild(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return Promise.resolve();
  return new Promise((ended) => {
    child.once('exit', () => ended());
    child.kill('SIGTERM');
  });
}
