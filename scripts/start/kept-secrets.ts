import { randomBytes } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';

/** Made once and kept, so that sessions, picture addresses and stored files outlive a restart. */
export interface KeptSecrets {
  /** Seals picture addresses. */
  secret: string;
  storeAccessKey: string;
  storeSecretKey: string;
}

const FILE = 'secrets.json';

function make(): KeptSecrets {
  return {
    secret: randomBytes(32).toString('base64url'),
    storeAccessKey: randomBytes(10).toString('hex').toUpperCase(),
    storeSecretKey: randomBytes(30).toString('base64url'),
  };
}

/** The secrets of this data folder; readable by its owner alone. */
export function keepSecrets(dataDir: string): KeptSecrets {
  const file = path.join(dataDir, FILE);
  if (fs.existsSync(file)) {
    fs.chmodSync(file, 0o600);
    return JSON.parse(fs.readFileSync(file, 'utf8')) as KeptSecrets;
  }
  const secrets = make();
  const draft = `${file}.new`;
  fs.writeFileSync(draft, JSON.stringify(secrets, null, 2), { mode: 0o600 });
  fs.renameSync(draft, file);
  return secrets;
}
