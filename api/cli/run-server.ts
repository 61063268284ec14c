import { createServer, type Server } from 'node:http';
import express from 'express';
import type { Logger } from 'pino';
import { freePort } from '../../database/server/cluster.ts';
import { createApp } from '../app.ts';
import type { Config } from '../config.ts';
import { lettersPage } from '../mail/letters-page.ts';
import type { MailSink } from '../mail/sink.ts';
import type { Installation } from './installation.ts';
import { openServices } from './services.ts';

export interface RunningServer {
  /** Where people find it. */
  address: string;
  /** Answers what has begun, then closes everything the server opened. */
  stop(): Promise<void>;
}

/** Streams of progress never end by themselves; after this they are cut. */
const PATIENCE_MS = 2_000;

/**
 * Serves pages and API and works off the queue in this process.
 * @throws the error of listening, with `syscall: 'listen'`
 */
export async function runServer(
  installation: Installation,
  options: { webRoot: string | undefined; logger: Logger; sink?: MailSink },
): Promise<RunningServer> {
  const config = await withPort(installation.config);
  const services = await openServices(
    { ...installation, config },
    { logger: options.logger, smtpUrl: options.sink?.smtpUrl },
  );
  const outer = express().disable('x-powered-by');
  if (options.sink) outer.use('/demo/letters', lettersPage(options.sink));
  outer.use(createApp({ ...services.deps, webRoot: options.webRoot }));
  const server = createServer(outer);
  try {
    await listen(server, config.host, config.port);
    await services.work();
    return {
      address: config.publicUrl,
      stop: async () => {
        await closeServer(server);
        await services.close();
      },
    };
  } catch (error) {
    await closeServer(server);
    await services.close();
    throw error;
  }
}

/** Port 0 asks for any free one; the address has to be known before the first request is judged by it. */
async function withPort(config: Config): Promise<Config> {
  if (config.port !== 0) return config;
  const port = await freePort();
  const url = new URL(config.publicUrl);
  if (url.port === '0') url.port = String(port);
  return { ...config, port, publicUrl: url.origin };
}

function listen(server: Server, host: string, port: number): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => {
      server.off('error', reject);
      resolve();
    });
  });
}

function closeServer(server: Server): Promise<void> {
  if (!server.listening) return Promise.resolve();
  return new Promise((resolve) => {
    const cut = setTimeout(() => server.closeAllConnections(), PATIENCE_MS);
    server.close(() => {
      clearTimeout(cut);
      resolve();
    });
    server.closeIdleConnections();
  });
}
