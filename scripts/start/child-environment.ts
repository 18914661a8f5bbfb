import type { KeptSecrets } from './kept-secrets.ts';
import type { StartSettings } from './settings.ts';

/** Where things are, once they run. */
export interface Addresses {
  databaseUrl: string;
  storeEndpoint: string;
  smtpUrl: string;
  mailsPage: string | null;
}

/** The address people use. */
export function publicAddress(settings: StartSettings): string {
  return process.env.ORIEL_ADDRESS || `http://${settings.host}:${settings.ports.web}`;
}

/** A line such as ORIEL_SECRET= in a .env file means: as without it. */
function withoutEmpty(environment: Record<string, string | undefined>): Record<string, string | undefined> {
  return Object.fromEntries(Object.entries(environment).filter(([, value]) => value !== ''));
}

/** The environment of the API and the worker: what was given, completed by what this start made itself. */
export function childEnvironment(settings: StartSettings, secrets: KeptSecrets, addresses: Addresses): Record<string, string | undefined> {
  const { ports, dev, outside } = settings;
  return {
    ...withoutEmpty(process.env),
    ORIEL_WEB_ROOT: settings.webRoot,
    NODE_ENV: process.env.NODE_ENV || (dev ? 'development' : 'production'),
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
    ORIEL_PORT: String(dev ? ports.devApi : ports.web),
    ORIEL_METRICS_PORT: String(ports.metrics),
    ORIEL_WORKER_METRICS_PORT: String(ports.workerMetrics),
    ORIEL_ADDRESS: publicAddress(settings),
    ORIEL_DATABASE_URL: addresses.databaseUrl,
    ORIEL_STORE_ENDPOINT: addresses.storeEndpoint,
    ORIEL_STORE_BUCKET: settings.bucket,
    ORIEL_STORE_REGION: settings.region,
    ORIEL_STORE_ACCESS_KEY: outside.store ? process.env.ORIEL_STORE_ACCESS_KEY : secrets.storeAccessKey,
    ORIEL_STORE_SECRET_KEY: outside.store ? process.env.ORIEL_STORE_SECRET_KEY : secrets.storeSecretKey,
    ORIEL_SMTP_URL: addresses.smtpUrl,
    ORIEL_SECRET: process.env.ORIEL_SECRET || secrets.secret,
    ...(addresses.mailsPage && !process.env.ORIEL_MAILS_PAGE ? { ORIEL_MAILS_PAGE: addresses.mailsPage } : {}),
  };
}
