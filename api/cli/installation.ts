import { join } from 'node:path';
import pg from 'pg';
import { type ByDatabaseRole, type RoleSettings, roleUrls } from '../../database/role-names.ts';
import { findOrInstallBinaries } from '../../database/server/binaries.ts';
import { startCluster } from '../../database/server/cluster.ts';
import { chooseBaseFolder, chooseDataFolder } from '../../database/server/data-folder.ts';
import { takeStartLock } from '../../database/server/start-lock.ts';
import { type Config, loadConfig } from '../config.ts';
import { loadSecrets, type Secrets } from '../secrets.ts';

/** Configuration, secrets and database of this installation, ready to be used. */
export interface Installation {
  config: Config;
  secrets: Secrets;
  /** Folder for secrets, files and letters. */
  dataFolder: string;
  ownerUrl: string;
  roles: RoleSettings;
  urls: ByDatabaseRole<string>;
  /** Resolves with true when the private PostgreSQL ends by itself; never where it is not ours. */
  databaseEnded: Promise<boolean>;
  /** Address of another database on the private server, by its name; undefined on a server of your own. */
  privateUrlFor: ((database: string) => string) | undefined;
  /** Stops what was started here. */
  close(): Promise<void>;
}

/** The demo has a database of its own: an installation without it never holds its accounts. */
export const DEMO_DATABASE = 'tetherline_demo';
const PLAIN_DATABASE = 'tetherline';
const LOCK_WAIT_MS = 240_000;

/**
 * Reads the environment, loads or makes the secrets and starts or joins the private PostgreSQL, unless
 * DATABASE_URL names another.
 * @param whileLocked work that no other start of this data folder may do at the same time
 * @throws ConfigProblem, ClusterProblem, SecretProblem
 */
export async function openInstallation(
  root: string,
  env: NodeJS.ProcessEnv,
  whileLocked: (installation: Installation) => Promise<void> = () => Promise.resolve(),
): Promise<Installation> {
  const config = loadConfig(env);
  return config.databaseUrl === undefined
    ? await openPrivate(root, env, config, whileLocked)
    : await openGiven(root, env, config, config.databaseUrl, whileLocked);
}

async function openGiven(
  root: string,
  env: NodeJS.ProcessEnv,
  config: Config,
  ownerUrl: string,
  whileLocked: (installation: Installation) => Promise<void>,
): Promise<Installation> {
  const dataFolder = chooseBaseFolder(root, env);
  const secrets = loadSecrets(dataFolder, env);
  const roles = { rolePrefix: config.dbRolePrefix, passwords: secrets.rolePasswords };
  const installation: Installation = {
    config: withOwnBucket(config, new URL(ownerUrl).pathname.slice(1)),
    secrets,
    dataFolder,
    ownerUrl,
    roles,
    urls: roleUrls(ownerUrl, roles),
    databaseEnded: new Promise(() => undefined),
    privateUrlFor: undefined,
    close: () => Promise.resolve(),
  };
  await whileLocked(installation);
  return installation;
}

async function openPrivate(
  root: string,
  env: NodeJS.ProcessEnv,
  config: Config,
  whileLocked: (installation: Installation) => Promise<void>,
): Promise<Installation> {
  // Installing PostgreSQL also makes the user it runs as, so it comes before the choice of a folder.
  await findOrInstallBinaries(env);
  const folder = await chooseDataFolder(root, env);
  const unlock = await takeStartLock(join(folder.base, 'start.lock'), LOCK_WAIT_MS);
  try {
    const binaries = await findOrInstallBinaries(env, folder.existingMajor);
    const secrets = loadSecrets(folder.base, env);
    const cluster = await startCluster({
      binaries,
      folder: folder.cluster,
      user: folder.user,
      password: secrets.clusterPassword,
    });
    try {
      const database = config.demo ? DEMO_DATABASE : PLAIN_DATABASE;
      const ownerUrl = cluster.urlFor(database);
      const roles = { rolePrefix: config.dbRolePrefix, passwords: secrets.rolePasswords };
      const installation: Installation = {
        config: withOwnBucket(config, database),
        secrets,
        dataFolder: folder.base,
        ownerUrl,
        roles,
        urls: roleUrls(ownerUrl, roles),
        databaseEnded: cluster.ended,
        privateUrlFor: cluster.urlFor,
        close: cluster.stop,
      };
      if (!config.demo) await ensureDatabase(cluster.urlFor('postgres'), database);
      await whileLocked(installation);
      return installation;
    } catch (error) {
      await cluster.stop();
      throw error;
    }
  } finally {
    unlock();
  }
}

/** Local files of two databases stay apart: each keeps its own anchors of the audit trail. */
function withOwnBucket(config: Config, database: string): Config {
  if (!config.storage.local) return config;
  const bucket = database.toLowerCase().replace(/[^a-z0-9]+/g, '-') || config.storage.bucket;
  return { ...config, storage: { ...config.storage, bucket } };
}

export async function databaseExists(adminUrl: string, name: string): Promise<boolean> {
  return await asAdmin(adminUrl, async (client) => {
    const found = await client.query('SELECT 1 FROM pg_database WHERE datname = $1', [name]);
    return found.rows.length > 0;
  });
}

export async function ensureDatabase(adminUrl: string, name: string): Promise<void> {
  if (await databaseExists(adminUrl, name)) return;
  await asAdmin(adminUrl, (client) => client.query(`CREATE DATABASE ${name}`));
}

/** One connection to the server's own database, for statements about other databases. */
export async function asAdmin<T>(
  adminUrl: string,
  use: (client: pg.Client) => Promise<T>,
): Promise<T> {
  const client = new pg.Client({ connectionString: adminUrl });
  await client.connect();
  try {
    return await use(client);
  } finally {
    await client.end();
  }
}
