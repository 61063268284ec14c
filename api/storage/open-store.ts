import { join } from 'node:path';
import type { StorageConfig } from '../config.ts';
import { startLocalEndpoint } from './local-endpoint.ts';
import type { ObjectStore } from './object-store.ts';
import { ensureBucket, openS3Store, type S3Settings } from './s3-store.ts';

/** The store of this installation; where none is named, a local endpoint over files in the data folder. */
export async function openStore(
  config: StorageConfig,
  local: { dataFolder: string; key: string },
): Promise<{ store: ObjectStore; close(): Promise<void> }> {
  if (!config.local) {
    const { accessKeyId, secretAccessKey } = config;
    const store = openS3Store({
      endpoint: config.endpoint,
      bucket: config.bucket,
      region: config.region,
      credentials: accessKeyId && secretAccessKey ? { accessKeyId, secretAccessKey } : undefined,
    });
    return {
      store,
      close: async () => store.close(),
    };
  }
  const endpoint = await startLocalEndpoint(join(local.dataFolder, 'files'), local.key);
  const settings: S3Settings = {
    endpoint: endpoint.url,
    bucket: config.bucket,
    region: config.region,
    credentials: { accessKeyId: local.key, secretAccessKey: local.key },
  };
  await ensureBucket(settings);
  const store = openS3Store(settings);
  return {
    store,
    close: async () => {
      store.close();
      await endpoint.close();
    },
  };
}
