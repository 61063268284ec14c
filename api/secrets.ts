import { hkdfSync, randomBytes } from 'node:crypto';
import {
  closeSync,
  existsSync,
  fsyncSync,
  openSync,
  readFileSync,
  renameSync,
  writeSync,
} from 'node:fs';
import { join } from 'node:path';

/** Everything that must stay unknown outside the server. All of it follows from one master secret. */
export interface Secrets {
  /** Signs access tokens. */
  jwtKey: string;
  /** Keys the hashes of addresses, refresh tokens and the like. */
  hashKey: string;
  /** Owner of the private PostgreSQL. */
  clusterPassword: string;
  rolePasswords: { masked: string; board: string; open: string };
  /** Opens the local object storage. */
  storageKey: string;
}

const FILE = 'secret.json';
const BYTES = 32;

export class SecretProblem extends Error {
  readonly place: string;

  constructor(place: string) {
    super(`unreadable master secret: ${place}`);
    this.name = 'SecretProblem';
    this.place = place;
  }
}

/**
 * The secrets of this installation. `TETHERLINE_SECRET` (64 hexadecimal digits) lets several machines share
 * one; otherwise it is made at the first start and kept in the data folder for its owner alone.
 * @throws SecretProblem where the variable or the file is not such a secret
 */
export function loadSecrets(dataFolder: string, env: NodeJS.ProcessEnv): Secrets {
  if (env.TETHERLINE_SECRET) return deriveSecrets(env.TETHERLINE_SECRET, 'TETHERLINE_SECRET');
  const file = join(dataFolder, FILE);
  if (!existsSync(file))
    writeWhole(file, JSON.stringify({ secret: randomBytes(BYTES).toString('hex') }));
  return deriveSecrets(readSecret(file), file);
}

/**
 * @param master 64 hexadecimal digits
 * @param place what to name when they are not
 * @throws SecretProblem
 */
export function deriveSecrets(master: string, place: string): Secrets {
  if (!/^[0-9a-f]{64}$/i.test(master)) throw new SecretProblem(place);
  const key = Buffer.from(master, 'hex');
  const derive = (purpose: string) =>
    Buffer.from(hkdfSync('sha256', key, '', `tetherline ${purpose}`, BYTES)).toString('base64url');
  return {
    jwtKey: derive('access tokens'),
    hashKey: derive('hashes'),
    clusterPassword: derive('cluster owner'),
    rolePasswords: {
      masked: derive('database role masked'),
      board: derive('database role board'),
      open: derive('database role open'),
    },
    storageKey: derive('object storage'),
  };
}

function readSecret(file: string): string {
  try {
    const content: unknown = JSON.parse(readFileSync(file, 'utf8'));
    const secret = (content as { secret?: unknown }).secret;
    return typeof secret === 'string' ? secret : '';
  } catch (error) {
    if (error instanceof SyntaxError) throw new SecretProblem(file);
    throw error;
  }
}

/** Never a half-written secret: losing it would lock the owner out of the database. */
function writeWhole(file: string, text: string): void {
  const draft = `${file}.new`;
  const handle = openSync(draft, 'w', 0o600);
  writeSync(handle, text);
  fsyncSync(handle);
  closeSync(handle);
  renameSync(draft, file);
}
