import { randomUUID, timingSafeEqual } from 'node:crypto';
import { createReadStream, createWriteStream } from 'node:fs';
import { mkdir, readdir, rename, rm, stat } from 'node:fs/promises';
import { createServer, type IncomingMessage, type ServerResponse } from 'node:http';
import { dirname, join, relative, resolve, sep } from 'node:path';
import { pipeline } from 'node:stream/promises';

export interface LocalEndpoint {
  url: string;
  close(): Promise<void>;
}

/**
 * A small S3 endpoint on loopback that keeps each object as a file: put, get, delete and list of one page.
 * It stands in for hosted storage in development, demo and tests, so that the application always speaks S3.
 * @param folder one folder below it for each bucket
 * @param accessKeyId callers must name it; others on this machine are refused
 */
export async function startLocalEndpoint(
  folder: string,
  accessKeyId: string,
): Promise<LocalEndpoint> {
  await mkdir(folder, { recursive: true, mode: 0o700 });
  const server = createServer((request, response) => {
    answer(folder, accessKeyId, request, response).catch((error: NodeJS.ErrnoException) => {
      if (response.headersSent) response.destroy(error);
      else if (error.code === 'ENOENT') fail(response, 404, 'NoSuchKey');
      else fail(response, 500, 'InternalError');
    });
  });
  await new Promise<void>((ready, refuse) => {
    server.once('error', refuse);
    server.listen(0, '127.0.0.1', ready);
  });
  server.unref();
  const address = server.address();
  if (address === null || typeof address === 'string') throw new Error('no port');
  return {
    url: `http://127.0.0.1:${address.port}`,
    close: () =>
      new Promise((closed) => {
        server.close(() => closed());
        server.closeAllConnections();
      }),
  };
}

async function answer(
  folder: string,
  accessKeyId: string,
  request: IncomingMessage,
  response: ServerResponse,
): Promise<void> {
  if (!namesKey(request, accessKeyId)) return fail(response, 403, 'AccessDenied');
  const url = new URL(request.url ?? '/', 'http://local');
  const path = decodeURIComponent(url.pathname).replace(/^\//, '');
  const file = resolve(folder, path);
  const inside = relative(folder, file);
  if (inside === '' || inside.startsWith('..')) return fail(response, 400, 'InvalidRequest');
  const isBucket = !path.replace(/\/$/, '').includes('/');

  if (request.method === 'PUT' && isBucket) {
    await mkdir(file, { recursive: true, mode: 0o700 });
    response.writeHead(200).end();
  } else if (request.method === 'PUT') {
    await receive(request, file, join(folder, `.incoming-${randomUUID()}`));
    response.writeHead(200, { etag: `"${randomUUID()}"` }).end();
  } else if (request.method === 'HEAD') {
    const { size } = await stat(file);
    response.writeHead(200, isBucket ? {} : { 'content-length': size }).end();
  } else if (request.method === 'GET' && isBucket) {
    await list(file, url.searchParams.get('prefix') ?? '', response);
  } else if (request.method === 'GET') {
    const { size } = await stat(file);
    response.writeHead(200, { 'content-length': size });
    await pipeline(createReadStream(file), response);
  } else if (request.method === 'DELETE' && !isBucket) {
    await rm(file, { force: true });
    response.writeHead(204).end();
  } else fail(response, 405, 'MethodNotAllowed');
}

/** A file appears under its key only when all of it has arrived. */
async function receive(request: IncomingMessage, file: string, draft: string): Promise<void> {
  try {
    await pipeline(request, createWriteStream(draft, { mode: 0o600 }));
    await mkdir(dirname(file), { recursive: true, mode: 0o700 });
    await rename(draft, file);
  } finally {
    await rm(draft, { force: true });
  }
}

async function list(bucket: string, prefix: string, response: ServerResponse): Promise<void> {
  const entries = await readdir(bucket, { recursive: true, withFileTypes: true });
  const files = entries.filter((entry) => entry.isFile());
  const keys = files
    .map((entry) => relative(bucket, join(entry.parentPath, entry.name)).split(sep).join('/'))
    .filter((key) => key.startsWith(prefix))
    .sort();
  const items = await Promise.all(
    keys.map(async (key) => {
      const { size } = await stat(join(bucket, key));
      return `<Contents><Key>${escapeXml(key)}</Key><Size>${size}</Size></Contents>`;
    }),
  );
  response
    .writeHead(200, { 'content-type': 'application/xml' })
    .end(`<ListBucketResult><IsTruncated>false</IsTruncated>${items.join('')}</ListBucketResult>`);
}

function namesKey(request: IncomingMessage, accessKeyId: string): boolean {
  const named = /Credential=([^/]+)\//.exec(request.headers.authorization ?? '')?.[1] ?? '';
  const given = Buffer.from(named);
  const wanted = Buffer.from(accessKeyId);
  return given.length === wanted.length && timingSafeEqual(given, wanted);
}

function fail(response: ServerResponse, status: number, code: string): void {
  response
    .writeHead(status, { 'content-type': 'application/xml' })
    .end(`<Error><Code>${code}</Code></Error>`);
}

function escapeXml(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;');
}
