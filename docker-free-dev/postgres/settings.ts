const COMMON = {
  listen_addresses: '127.0.0.1',
  // No socket file: its path is limited to 107 bytes (unix(7)) and nothing of ours uses it.
  unix_socket_directories: '',
  max_connections: '100',
  timezone: 'UTC',
  log_timezone: 'UTC',
  jit: 'off',
};

/** A test's cluster is thrown away, so nothing in it has to survive a power cut. */
const THROW_AWAY = {
  fsync: 'off',
  synchronous_commit: 'off',
  full_page_writes: 'off',
  wal_level: 'minimal',
  max_wal_senders: '0',
  autovacuum_naptime: '5min',
};

const DURABLE = { fsync: 'on', synchronous_commit: 'on', full_page_writes: 'on' };

/** Command line of postgres: everything that matters is here and not in files somebody may have edited. */
export function serverArguments(cluster: string, port: number, durable: boolean): string[] {
  const settings = { ...COMMON, ...(durable ? DURABLE : THROW_AWAY) };
  const options = Object.entries(settings).flatMap(([name, value]) => ['-c', `${name}=${value}`]);
  return ['-D', cluster, '-p', String(port), ...options];
}
