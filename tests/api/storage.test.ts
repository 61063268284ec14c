import { mkdtemp, readdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { buffer } from 'node:stream/consumers';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { loadConfig } from '../../api/config.ts';
import { startLocalEndpoint } from '../../api/storage/local-endpoint.ts';
import { ObjectMissing, type ObjectStore } from '../../api/storage/object-store.ts';
import { openStore } from '../../api/storage/open-store.ts';
import { openS3Store } from '../../api/storage/s3-store.ts';

describe('object storage over the local endpoint', () => {
  let folder: string;
  let store: ObjectStore;
  let close: () => Promise<void>;

  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'tetherline-storage-'));
    ({ store, close } = await openStore(loadConfig({}).storage, {
      dataFolder: folder,
      key: 'key-of-this-test',
    }));
  });
  afterAll(async () => {
    await close();
    await rm(folder, { recursive: true, force: true });
  });

  it('gives back the bytes of a stream of unknown length', async () => {
    const bytes = Buffer.from(Array.from({ length: 300_000 }, (_, index) => index % 251));
    await store.put('imports/a', Readable.from([bytes.subarray(0, 7), bytes.subarray(7)]));
    expect(await buffer(await store.get('imports/a'))).toEqual(bytes);
  });

  it('gives back the bytes of a stream whose length is known, unframed', async () => {
    const bytes = Buffer.from('subject,value\nA1,3.5\n');
    await store.put('imports/b', Readable.from([bytes]), { size: bytes.length, type: 'text/csv' });
    expect((await buffer(await store.get('imports/b'))).toString()).toBe('subject,value\nA1,3.5\n');
  });

  it('keeps an empty object', async () => {
    await store.put('empty', Buffer.alloc(0));
    expect(await buffer(await store.get('empty'))).toHaveLength(0);
  });

  it('lists below a prefix in order of key, with sizes', async () => {
    await store.put('anchors/2', Buffer.from('22'));
    await store.put('anchors/1', Buffer.from('1'));
    await store.put('anchors&<odd>/3', Buffer.from('333'));
    expect(await store.list('anchors/')).toEqual([
      { key: 'anchors/1', size: 1 },
      { key: 'anchors/2', size: 2 },
    ]);
    expect(await store.list('anchors&')).toEqual([{ key: 'anchors&<odd>/3', size: 3 }]);
  });

  it('replaces an object, and deletes it twice without complaint', async () => {
    await store.put('again', Buffer.from('old'));
    await store.put('again', Buffer.from('new'));
    expect((await buffer(await store.get('again'))).toString()).toBe('new');
    await store.delete('again');
    await store.delete('again');
    await expect(store.get('again')).rejects.toBeInstanceOf(ObjectMissing);
  });

  it('leaves nothing behind when a stream breaks', async () => {
    const broken = Readable.from(
      (function* () {
        yield Buffer.from('half');
        throw new Error('the line broke');
      })(),
    );
    await expect(store.put('broken', broken)).rejects.toThrow('the line broke');
    await expect(store.get('broken')).rejects.toBeInstanceOf(ObjectMissing);
    const left = await readdir(join(folder, 'files'));
    expect(left.filter((name) => name.startsWith('.incoming'))).toEqual([]);
  });

  it('refuses a caller with another key, and a key that climbs out of its folder', async () => {
    const endpoint = await startLocalEndpoint(join(folder, 'files'), 'right-key');
    const settings = { endpoint: endpoint.url, bucket: 'tetherline', region: 'us-east-1' };
    const stranger = openS3Store({
      ...settings,
      credentials: { accessKeyId: 'wrong-key', secretAccessKey: 'x' },
    });
    await expect(stranger.get('imports/a')).rejects.toThrow(/AccessDenied|UnknownError/);
    const answer = await fetch(`${endpoint.url}/..%2F..%2Fetc%2Fpasswd`, {
      headers: { authorization: 'AWS4-HMAC-SHA256 Credential=right-key/x' },
    });
    expect(answer.status).toBe(400);
    stranger.close();
    await endpoint.close();
  });
});
