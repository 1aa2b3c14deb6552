import { z } from 'zod';

/** Secrets that stand in `.env.example` or in tests; a production start refuses them. */
const SAMPLE_SECRETS = new Set([
  'change-me',
  'sk_test_local',
  'whsec_local',
  'test-session-secret-test-session-secret',
]);

const url = z.url();

const schema = z.object({
  NODE_ENV: z.enum(['development', 'test', 'production']).default('development'),
  PUBLIC_URL: url,
  HOST: z.string().default('127.0.0.1'),
  PORT: z.coerce.number().int().min(0).max(65_535).default(3000),
  DATABASE_URL: z.string().startsWith('mariadb://'),
  DATABASE_OWNER_URL: z.string().startsWith('mariadb://').optional(),
  DATABASE_POOL_MAX: z.coerce.number().int().min(2).max(100).default(12),
  SESSION_SECRET: z.string().min(32),
  STRIPE_SECRET_KEY: z.string().min(1),
  STRIPE_WEBHOOK_SECRET: z.string().min(1),
  STRIPE_API_BASE: z.union([url, z.literal('')]).default(''),
  QUOTES_URL: url,
  QUOTES_API_KEY: z.string().min(1),
  SMTP_URL: z.string().regex(/^smtps?:\/\//),
  MAIL_FROM: z.string().min(3),
  CARRIER_URL: url,
  CARRIER_API_KEY: z.string().min(1),
  STORAGE_DIR: z.string().min(1),
  S3_BUCKET: z.string().default(''),
  S3_ENDPOINT: z.string().default(''),
  S3_REGION: z.string().default('us-east-1'),
  S3_ACCESS_KEY_ID: z.string().default(''),
  S3_SECRET_ACCESS_KEY: z.string().default(''),
  CLIENT_DIST_DIR: z.string().default('dist/client'),
  TRUST_PROXY: z.coerce.number().int().min(0).max(5).default(0),
  RATE_LIMIT_FACTOR: z.coerce.number().int().min(1).max(1000).default(1),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'silent']).default('info'),
});

export type Env = Readonly<z.infer<typeof schema>>;

/** The word that stands for every secret in `.env.example`, also inside an address. */
const SAMPLE_WORD = 'change-me';
const ADDRESSES_AND_KEYS = [
  'DATABASE_URL',
  'DATABASE_OWNER_URL',
  'QUOTES_API_KEY',
  'SMTP_URL',
  'CARRIER_API_KEY',
  'S3_SECRET_ACCESS_KEY',
] as const;

function isLoopback(address: string): boolean {
  return /\/\/([^@/]*@)?(localhost|127\.|\[::1\])/.test(address);
}

/** What a production start must not have: sample secrets, stand-ins on loopback, plain http. */
function productionFaults(env: Env): string[] {
  const faults: string[] = [];
  for (const name of ['SESSION_SECRET', 'STRIPE_SECRET_KEY', 'STRIPE_WEBHOOK_SECRET'] as const) {
    if (SAMPLE_SECRETS.has(env[name])) faults.push(`${name} is a sample value`);
  }
  for (const name of ADDRESSES_AND_KEYS) {
    if (env[name]?.includes(SAMPLE_WORD)) faults.push(`${name} holds a sample value`);
  }
  if (env.STRIPE_API_BASE !== '') faults.push('STRIPE_API_BASE points the payment SDK at a stand-in');
  if (env.STRIPE_SECRET_KEY.startsWith('sk_test_')) faults.push('STRIPE_SECRET_KEY is a test key');
  if (!env.PUBLIC_URL.startsWith('https://')) faults.push('PUBLIC_URL must be https');
  for (const name of ['QUOTES_URL', 'CARRIER_URL', 'SMTP_URL'] as const) {
    if (isLoopback(env[name])) faults.push(`${name} is on loopback, where only stand-ins live`);
  }
  if (env.RATE_LIMIT_FACTOR !== 1) faults.push('RATE_LIMIT_FACTOR must be 1');
  return faults;
}

/** Reads and checks the environment once; every fault is named in one error, so that one start shows them all. */
export function parseEnv(source: NodeJS.ProcessEnv): Env {
  const parsed = schema.safeParse(source);
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`The environment is not complete (see .env.example):\n${lines.join('\n')}`);
  }
  if (parsed.data.NODE_ENV === 'production') {
    const faults = productionFaults(parsed.data);
    if (faults.length > 0) throw new Error(`A production start is refused:\n  ${faults.join('\n  ')}`);
  }
  return Object.freeze(parsed.data);
}
