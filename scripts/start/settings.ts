import fs from 'node:fs';
import path from 'node:path';

/** What npm start needs to know itself; everything else in the environment goes on to the API and the worker. */
export interface StartSettings {
  dataDir: string;
  dev: boolean;
  /** Whether an empty database gets the demo. */
  demo: boolean;
  host: string;
  ports: Ports;
  /** Real services outside, where the environment names them; the local one of that kind is not started then. */
  outside: { database: string | undefined; store: string | undefined; smtp: string | undefined };
  bucket: string;
  region: string;
  /** The built pages. */
  webRoot: string;
}

export interface Ports {
  web: number;
  metrics: number;
  workerMetrics: number;
  database: number;
  store: number;
  smtp: number;
  mails: number;
  /** The API behind the page server of npm run dev. */
  devApi: number;
}

/** The variable that moves each port, and where it is without it. */
export const PORT_VARIABLES: Record<keyof Ports, [variable: string, standard: number]> = {
  web: ['ORIEL_PORT', 4400],
  metrics: ['ORIEL_METRICS_PORT', 4401],
  database: ['ORIEL_DB_PORT', 4402],
  store: ['ORIEL_STORE_PORT', 4403],
  smtp: ['ORIEL_SMTP_PORT', 4404],
  mails: ['ORIEL_MAILS_PORT', 4405],
  workerMetrics: ['ORIEL_WORKER_METRICS_PORT', 4406],
  devApi: ['ORIEL_DEV_API_PORT', 4407],
};

type Environment = Record<string, string | undefined>;

function readPort(environment: Environment, [variable, standard]: [string, number]): number {
  const text = environment[variable];
  if (text === undefined || text === '') return standard;
  const port = Number(text);
  if (!/^\d+$/.test(text) || port < 1 || port > 65_535) throw new Error(`${variable} must be a port between 1 and 65535, not "${text}".`);
  return port;
}

function readPorts(environment: Environment): Ports {
  const entries = Object.entries(PORT_VARIABLES).map(([name, variable]) => [name, readPort(environment, variable)]);
  return Object.fromEntries(entries) as unknown as Ports;
}

function readDemoSwitch(text: string | undefined): boolean {
  if (text === undefined || text === '' || text === 'yes') return true;
  if (text === 'no') return false;
  throw new Error(`ORIEL_DEMO must be yes or no, not "${text}".`);
}

/** Adds the lines of a .env file to the environment; what is set already wins. */
export function loadDotEnv(root: string): void {
  const file = path.join(root, '.env');
  if (fs.existsSync(file)) process.loadEnvFile(file);
}

/** @throws Error with a sentence naming the variable that is wrong */
export function readSettings(environment: Environment, argv: string[]): StartSettings {
  const outside = {
    database: environment.ORIEL_DATABASE_URL || undefined,
    store: environment.ORIEL_STORE_ENDPOINT || undefined,
    smtp: environment.ORIEL_SMTP_URL || undefined,
  };
  if (outside.store && !(environment.ORIEL_STORE_ACCESS_KEY && environment.ORIEL_STORE_SECRET_KEY)) {
    throw new Error('ORIEL_STORE_ENDPOINT is set, so ORIEL_STORE_ACCESS_KEY and ORIEL_STORE_SECRET_KEY must be set as well.');
  }
  return {
    dataDir: path.resolve(environment.ORIEL_DATA_DIR || 'data'),
    dev: argv.includes('--dev'),
    demo: readDemoSwitch(environment.ORIEL_DEMO),
    host: environment.ORIEL_HOST || '127.0.0.1',
    ports: readPorts(environment),
    outside,
    bucket: environment.ORIEL_STORE_BUCKET || 'oriel',
    region: environment.ORIEL_STORE_REGION || 'us-east-1',
    webRoot: environment.ORIEL_WEB_ROOT || 'dist/web',
  };
}
