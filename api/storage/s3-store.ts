import { randomUUID } from 'node:crypto';
import { createReadStream, createWriteStream } from 'node:fs';
import { mkdtemp, rm, stat } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import {
  CreateBucketCommand,
  DeleteObjectCommand,
  GetObjectCommand,
  HeadBucketCommand,
  ListObjectsV2Command,
  PutObjectCommand,
  S3Client,
} from '@aws-sdk/client-s3';
import { ObjectMissing, type ObjectStore, type StoredObject } from './object-store.ts';

// The SDK would print a notice about its later versions at every start; ours is pinned to one for this Node.
process.env.AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED = 'true';

export interface S3Settings {
  endpoint: string | undefined;
  bucket: string;
  region: string;
  /** Undefined: the SDK's own chain (environment, profile, machine role). */
  credentials: { accessKeyId: string; secretAccessKey: string } | undefined;
}

/** An object store that speaks S3, to whichever endpoint the settings name. */
export function openS3Store(settings: S3Settings): ObjectStore {
  const client = new S3Client({
    region: settings.region,
    ...(settings.endpoint ? { endpoint: settings.endpoint, forcePathStyle: true } : {}),
    ...(settings.credentials ? { credentials: settings.credentials } : {}),
    // Streamed bodies would otherwise be framed in chunks with checksums, which simple endpoints store as they come.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
  });
  const bucket = settings.bucket;

  return {
    async put(key, body, options = {}) {
      const send = (content: Readable | Buffer, size: number) =>
        client.send(
          new PutObjectCommand({
            Bucket: bucket,
            Key: key,
            Body: content,
            ContentLength: size,
            ContentType: options.type ?? 'application/octet-stream',
          }),
        );
      if (Buffer.isBuffer(body)) await send(body, body.length);
      else if (options.size !== undefined) await send(body, options.size);
      else await throughFile(body, send);
    },
    async get(key) {
      try {
        const answer = await client.send(new GetObjectCommand({ Bucket: bucket, Key: key }));
        return answer.Body instanceof Readable ? answer.Body : Readable.from([]);
      } catch (error) {
        if (isMissing(error)) throw new ObjectMissing(key);
        throw error;
      }
    },
    async delete(key) {
      await client.send(new DeleteObjectCommand({ Bucket: bucket, Key: key }));
    },
    async list(prefix) {
      const found: StoredObject[] = [];
      let next: string | undefined;
      do {
        const page = await client.send(
          new ListObjectsV2Command({ Bucket: bucket, Prefix: prefix, ContinuationToken: next }),
        );
        for (const item of page.Contents ?? []) {
          if (item.Key !== undefined) found.push({ key: item.Key, size: item.Size ?? 0 });
        }
        next = page.NextContinuationToken;
      } while (next !== undefined);
      return found;
    },
    async check() {
      await client.send(new HeadBucketCommand({ Bucket: bucket }));
    },
    close() {
      client.destroy();
    },
  };
}

/** Makes the bucket where it is missing: for the local endpoint, and for a fresh one of your own. */
export async function ensureBucket(settings: S3Settings): Promise<void> {
  const client = new S3Client({
    region: settings.region,
    ...(settings.endpoint ? { endpoint: settings.endpoint, forcePathStyle: true } : {}),
    ...(settings.credentials ? { credentials: settings.credentials } : {}),
  });
  try {
    await client.send(new CreateBucketCommand({ Bucket: settings.bucket }));
  } finally {
    client.destroy();
  }
}

/** S3 wants the length first: a stream of unknown length passes through the temporary folder, never through memory. */
async function throughFile(
  body: Readable,
  send: (content: Readable, size: number) => Promise<unknown>,
): Promise<void> {
  const folder = await mkdtemp(join(tmpdir(), 'tetherline-upload-'));
  const file = join(folder, randomUUID());
  try {
    await pipeline(body, createWriteStream(file, { mode: 0o600 }));
    const { size } = await stat(file);
    await send(createReadStream(file), size);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

function isMissing(error: unknown): boolean {
  const name = (error as { name?: string }).name;
  return name === 'NoSuchKey' || name === 'NotFound';
}
