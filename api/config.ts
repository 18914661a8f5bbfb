import { z } from 'zod';

const flag = z.enum(['true', 'false']).transform((value) => value === 'true');
const megabytes = z.coerce.number().positive();

const Environment = z.object({
  NODE_ENV: z.enum(['development', 'test', 'production']).default('production'),
  ORIEL_PORT: z.coerce.number().int().min(0).default(4400),
  ORIEL_METRICS_PORT: z.coerce.number().int().min(0).default(4401),
  ORIEL_WORKER_METRICS_PORT: z.coerce.number().int().min(0).optional(),
  ORIEL_HOST: z.string().default('127.0.0.1'),
  /** What links in mails and signed addresses begin with. */
  ORIEL_ADDRESS: z.url().optional(),
  ORIEL_DATABASE_URL: z.string().min(1),
  ORIEL_DATABASE_CONNECTIONS: z.coerce.number().int().positive().default(12),
  ORIEL_STORE_ENDPOINT: z.url().optional(),
  ORIEL_STORE_REGION: z.string().default('us-east-1'),
  ORIEL_STORE_BUCKET: z.string().default('oriel'),
  ORIEL_STORE_ACCESS_KEY: z.string().min(1),
  ORIEL_STORE_SECRET_KEY: z.string().min(1),
  ORIEL_STORE_PATH_STYLE: flag.default(true),
  /** Where browsers fetch pictures: through the application, or straight from the store by presigned addresses. */
  ORIEL_PICTURES_FROM: z.enum(['application', 'store']).default('application'),
  ORIEL_SMTP_URL: z.string().min(1),
  ORIEL_MAIL_FROM: z.string().default('oriel@localhost'),
  /** Seals picture addresses; at least 32 characters. */
  ORIEL_SECRET: z.string().min(32),
  ORIEL_TRUST_PROXY: z.coerce.number().int().min(0).default(0),
  ORIEL_LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'),
  ORIEL_MAX_FILE_MB: megabytes.default(500),
  ORIEL_MAX_MEGAPIXELS: megabytes.default(300),
  ORIEL_STORAGE_GB: z.coerce.number().positive().default(500),
  ORIEL_WORKER_JOBS: z.coerce.number().int().positive().default(4),
  ORIEL_PIXEL_PROCESSES: z.coerce.number().int().positive().optional(),
  ORIEL_PIXEL_SECONDS: z.coerce.number().positive().default(120),
  ORIEL_MAILS_PAGE: z.url().optional(),
  ORIEL_WEB_ROOT: z.string().default('dist/web'),
});

export type Config = ReturnType<typeof loadConfig>;

/**
 * Reads the settings from the environment, the only place that does.
 * @throws Error naming every variable that is missing or wrong.
 */
export function loadConfig(environment: Record<string, string | undefined>) {
  const parsed = Environment.safeParse(environment);
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`The settings in the environment are not complete:\n${lines.join('\n')}`);
  }
  const env = parsed.data;
  const address = env.ORIEL_ADDRESS ?? `http://${env.ORIEL_HOST}:${env.ORIEL_PORT}`;
  return {
    environment: env.NODE_ENV,
    host: env.ORIEL_HOST,
    port: env.ORIEL_PORT,
    metricsPort: env.ORIEL_METRICS_PORT,
    workerMetricsPort: env.ORIEL_WORKER_METRICS_PORT,
    address: address.replace(/\/$/, ''),
    /** Cookies are Secure wherever the public address is https. */
    secureCookies: address.startsWith('https:'),
    secret: env.ORIEL_SECRET,
    trustProxy: env.ORIEL_TRUST_PROXY,
    logLevel: env.ORIEL_LOG_LEVEL,
    webRoot: env.ORIEL_WEB_ROOT,
    mailsPage: env.ORIEL_MAILS_PAGE,
    database: { url: env.ORIEL_DATABASE_URL, connections: env.ORIEL_DATABASE_CONNECTIONS },
    store: {
      endpoint: env.ORIEL_STORE_ENDPOINT,
      region: env.ORIEL_STORE_REGION,
      bucket: env.ORIEL_STORE_BUCKET,
      accessKeyId: env.ORIEL_STORE_ACCESS_KEY,
      secretAccessKey: env.ORIEL_STORE_SECRET_KEY,
      pathStyle: env.ORIEL_STORE_PATH_STYLE,
    },
    picturesFrom: env.ORIEL_PICTURES_FROM,
    mail: { url: env.ORIEL_SMTP_URL, from: env.ORIEL_MAIL_FROM },
    limits: {
      fileBytes: Math.floor(env.ORIEL_MAX_FILE_MB * 1_000_000),
      pixels: Math.floor(env.ORIEL_MAX_MEGAPIXELS * 1_000_000),
      storageBytes: Math.floor(env.ORIEL_STORAGE_GB * 1_000_000_000),
    },
    worker: { jobs: env.ORIEL_WORKER_JOBS, pixelProcesses: env.ORIEL_PIXEL_PROCESSES, pixelSeconds: env.ORIEL_PIXEL_SECONDS },
  };
}
