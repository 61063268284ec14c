import { isIP } from 'node:net';
import { z } from 'zod';

/** What the environment says, checked once; every default works on loopback with nothing set. */
export interface Config {
  host: string;
  port: number;
  /** Address people type; cookies are Secure when it starts with https. */
  publicUrl: string;
  secureCookies: boolean;
  /** Hops of reverse proxies whose forwarded addresses are believed. */
  trustedProxies: number;
  /** Demo studies, demo accounts and the mail sink. */
  demo: boolean;
  /** Owner's address of an own PostgreSQL; undefined where the private one is started. */
  databaseUrl: string | undefined;
  dbRolePrefix: string;
  storage: StorageConfig;
  mail: { smtpUrl: string | undefined; from: string };
  logLevel: 'fatal' | 'error' | 'warn' | 'info' | 'debug' | 'silent';
  /** Lets a collector read /metrics from elsewhere than loopback. */
  metricsToken: string | undefined;
}

export interface StorageConfig {
  /** Undefined: Amazon's own for the region when a bucket is named, else files in the data folder. */
  endpoint: string | undefined;
  bucket: string;
  region: string;
  accessKeyId: string | undefined;
  secretAccessKey: string | undefined;
  /** True where no bucket is named: the local endpoint keeps the files in the data folder. */
  local: boolean;
}

/** One variable that can't be used, with what would be right. */
export interface ConfigFault {
  variable: string;
  /** Looked up in the words of the command. */
  code:
    | 'port'
    | 'url'
    | 'database-url'
    | 'smtp-url'
    | 'on-off'
    | 'prefix'
    | 'number'
    | 'log-level'
    | 'keys-together'
    | 'bucket-missing'
    | 'demo-needs-loopback'
    | 'demo-needs-private-database'
    | 'demo-needs-sink';
  value: string;
}

export class ConfigProblem extends Error {
  readonly faults: readonly ConfigFault[];

  constructor(faults: readonly ConfigFault[]) {
    super(faults.map((fault) => `${fault.variable}: ${fault.code}`).join('; '));
    this.name = 'ConfigProblem';
    this.faults = faults;
  }
}

const url = (schemes: readonly string[], code: string) =>
  z.string().refine((text) => URL.canParse(text) && schemes.includes(new URL(text).protocol), code);
const optionalText = z.string().optional();

const environment = z.object({
  HOST: z.string().default('127.0.0.1'),
  PORT: z
    .string()
    .default('5170')
    .refine((text) => /^\d{1,5}$/.test(text) && Number(text) <= 65_535, 'port')
    .transform(Number),
  PUBLIC_URL: url(['http:', 'https:'], 'url').optional(),
  TRUSTED_PROXIES: z
    .string()
    .default('0')
    .refine((text) => /^\d$/.test(text), 'number')
    .transform(Number),
  DEMO: z
    .string()
    .optional()
    .refine((text) => text === undefined || ['on', 'off'].includes(text), 'on-off'),
  DATABASE_URL: url(['postgres:', 'postgresql:'], 'database-url').optional(),
  DB_ROLE_PREFIX: z
    .string()
    .default('tetherline')
    .refine((text) => /^[a-z][a-z0-9_]{0,30}$/.test(text), 'prefix'),
  S3_ENDPOINT: url(['http:', 'https:'], 'url').optional(),
  S3_BUCKET: optionalText,
  S3_REGION: z.string().default('us-east-1'),
  S3_ACCESS_KEY_ID: optionalText,
  S3_SECRET_ACCESS_KEY: optionalText,
  SMTP_URL: url(['smtp:', 'smtps:'], 'smtp-url').optional(),
  MAIL_FROM: z.string().default('Tetherline <tetherline@localhost>'),
  LOG_LEVEL: z
    .string()
    .default('info')
    .refine(
      (text) => ['fatal', 'error', 'warn', 'info', 'debug', 'silent'].includes(text),
      'log-level',
    )
    .transform((text) => text as Config['logLevel']),
  METRICS_TOKEN: optionalText,
});

/**
 * Reads the environment. An empty variable counts as unset.
 * @throws ConfigProblem naming every faulty variable at once
 */
export function loadConfig(env: NodeJS.ProcessEnv): Config {
  const filled = Object.fromEntries(Object.entries(env).filter(([, value]) => value !== ''));
  const parsed = environment.safeParse(filled);
  if (!parsed.success) {
    throw new ConfigProblem(
      parsed.error.issues.map((issue) => {
        const variable = String(issue.path[0]);
        return { variable, code: issue.message as ConfigFault['code'], value: env[variable] ?? '' };
      }),
    );
  }
  const values = parsed.data;
  const demo = values.DEMO === undefined ? values.DATABASE_URL === undefined : values.DEMO === 'on';
  const publicUrl = (values.PUBLIC_URL ?? addressOf(values.HOST, values.PORT)).replace(/\/$/, '');
  const faults = contradictions(values, demo, publicUrl);
  if (faults.length > 0) throw new ConfigProblem(faults);
  return {
    host: values.HOST,
    port: values.PORT,
    publicUrl,
    secureCookies: publicUrl.startsWith('https:'),
    trustedProxies: values.TRUSTED_PROXIES,
    demo,
    databaseUrl: values.DATABASE_URL,
    dbRolePrefix: values.DB_ROLE_PREFIX,
    storage: {
      endpoint: values.S3_ENDPOINT,
      bucket: values.S3_BUCKET ?? 'tetherline',
      region: values.S3_REGION,
      accessKeyId: values.S3_ACCESS_KEY_ID,
      secretAccessKey: values.S3_SECRET_ACCESS_KEY,
      local: values.S3_BUCKET === undefined,
    },
    mail: { smtpUrl: values.SMTP_URL, from: values.MAIL_FROM },
    logLevel: values.LOG_LEVEL,
    metricsToken: values.METRICS_TOKEN,
  };
}

function contradictions(
  values: z.infer<typeof environment>,
  demo: boolean,
  publicUrl: string,
): ConfigFault[] {
  const faults: ConfigFault[] = [];
  const refuse = (variable: string, code: ConfigFault['code'], value: string) =>
    faults.push({ variable, code, value });
  // Everybody can read the demo's passwords and the sink's letters: both stay on this machine.
  if (demo && !isLoopback(values.HOST)) refuse('HOST', 'demo-needs-loopback', values.HOST);
  if (demo && values.PUBLIC_URL !== undefined && !isLoopback(new URL(publicUrl).hostname)) {
    refuse('PUBLIC_URL', 'demo-needs-loopback', publicUrl);
  }
  if (demo && values.DATABASE_URL !== undefined) {
    refuse('DATABASE_URL', 'demo-needs-private-database', '');
  }
  if (demo && values.SMTP_URL !== undefined) refuse('SMTP_URL', 'demo-needs-sink', '');
  if ((values.S3_ACCESS_KEY_ID === undefined) !== (values.S3_SECRET_ACCESS_KEY === undefined)) {
    refuse('S3_ACCESS_KEY_ID', 'keys-together', '');
  }
  if (values.S3_ENDPOINT !== undefined && values.S3_BUCKET === undefined) {
    refuse('S3_BUCKET', 'bucket-missing', '');
  }
  return faults;
}

/** Addresses that only this machine can reach. */
export function isLoopback(host: string): boolean {
  const bare = host.replace(/^\[|\]$/g, '').toLowerCase();
  if (bare === 'localhost' || bare === '::1' || bare === '::ffff:127.0.0.1') return true;
  return isIP(bare) === 4 && bare.startsWith('127.');
}

function addressOf(host: string, port: number): string {
  return `http://${isIP(host) === 6 ? `[${host}]` : host}:${port}`;
}
