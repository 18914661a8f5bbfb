import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { PORT_VARIABLES, readSettings } from '../../scripts/start/settings.ts';

const names = (text: string): Set<string> => new Set(text.match(/\bORIEL_[A-Z_]+\b/g));

describe('the environment', () => {
  it('is listed whole in .env.example', () => {
    const listed = names(readFileSync('.env.example', 'utf8'));
    const used = [readFileSync('api/config.ts', 'utf8'), readFileSync('scripts/start/settings.ts', 'utf8')].flatMap((text) => [
      ...names(text),
    ]);
    expect([...new Set(used)].filter((name) => !listed.has(name))).toEqual([]);
    expect([...listed].filter((name) => !used.includes(name))).toEqual([]);
  });

  it('gives every service a port of its own', () => {
    const standard = Object.values(PORT_VARIABLES).map(([, port]) => port);
    expect(new Set(standard).size).toBe(standard.length);
    expect(readSettings({ ORIEL_PORT: '8080', ORIEL_DB_PORT: '' }, []).ports).toMatchObject({ web: 8080, database: 4402 });
  });

  it('that is wrong is answered with a sentence naming the variable', () => {
    for (const port of ['http', '0', '70000', '80.5', '-1']) {
      expect(() => readSettings({ ORIEL_PORT: port }, [])).toThrow(`ORIEL_PORT must be a port between 1 and 65535, not "${port}".`);
    }
    expect(() => readSettings({ ORIEL_STORE_ENDPOINT: 'https://store.example' }, [])).toThrow(/ORIEL_STORE_ACCESS_KEY/);
  });

  it('names real services, which keep their stand-ins from being started', () => {
    const settings = readSettings({ ORIEL_DATABASE_URL: 'postgres://db.example/oriel', ORIEL_SMTP_URL: '' }, ['--dev']);
    expect(settings).toMatchObject({ dev: true, outside: { database: 'postgres://db.example/oriel', store: undefined, smtp: undefined } });
  });
});
