import type { Knex } from 'knex';
import type { Logger } from 'pino';
import pg from 'pg';

const CHANNEL = 'oriel_live';
/** NOTIFY carries at most 8000 bytes; a change names what changed and the listener reads it anew. */
const LARGEST = 7500;

export interface Change {
  topic: string;
  what: string;
  [detail: string]: unknown;
}
type Listener = (change: Change) => void;

/** Tells every process about a change once the transaction commits. Topics are `commission:<id>` and `sheet:<id>`. */
export async function announce(db: Knex, topic: string, change: { what: string } & Record<string, unknown>): Promise<void> {
  const payload = JSON.stringify({ topic, ...change });
  const fits = Buffer.byteLength(payload) <= LARGEST;
  await db.raw('select pg_notify(?, ?)', [CHANNEL, fits ? payload : JSON.stringify({ topic, what: change.what })]);
}

/** Changes announced by any process, heard over one LISTEN connection that reconnects by itself. */
export class Live {
  readonly #listeners = new Map<string, Set<Listener>>();
  #client: pg.Client | undefined;
  #stopped = false;

  constructor(
    private readonly url: string,
    private readonly log: Logger,
  ) {}

  async start(): Promise<void> {
    const client = new pg.Client({ connectionString: this.url, application_name: 'oriel-live' });
    client.on('notification', (message) => this.#hear(message.payload ?? ''));
    client.on('error', () => this.#reconnect(client));
    client.on('end', () => this.#reconnect(client));
    await client.connect();
    await client.query(`listen ${CHANNEL}`);
    this.#client = client;
  }

  /** Calls `listener` for every change of a topic until the returned function is called. */
  listen(topic: string, listener: Listener): () => void {
    const listeners = this.#listeners.get(topic) ?? new Set();
    this.#listeners.set(topic, listeners.add(listener));
    return () => {
      listeners.delete(listener);
      if (listeners.size === 0) this.#listeners.delete(topic);
    };
  }

  async stop(): Promise<void> {
    this.#stopped = true;
    await this.#client?.end();
  }

  #hear(payload: string): void {
    const change = JSON.parse(payload) as Change;
    for (const listener of this.#listeners.get(change.topic) ?? []) listener(change);
  }

  #reconnect(lost: pg.Client): void {
    if (this.#stopped || (this.#client && this.#client !== lost)) return;
    this.#client = undefined;
    lost.removeAllListeners();
    lost.on('error', () => undefined);
    setTimeout(() => {
      if (this.#stopped) return;
      this.start().then(
        () => this.#missed(),
        (error: unknown) => {
          this.log.warn({ error: String(error) }, 'the live line to the database is down');
          this.#reconnect(lost);
        },
      );
    }, 1000).unref();
  }

  /** What was announced while the line was down is unknown, so everyone reads anew. */
  #missed(): void {
    for (const [topic, listeners] of this.#listeners) for (const listener of listeners) listener({ topic, what: 'missed' });
  }
}
