import type { RedisOptions } from 'ioredis';

/** Host, port, database and credentials of a `redis://` or `rediss://` address, as the client library wants them. */
export function redisAddress(redisUrl: string): RedisOptions {
  const url = new URL(redisUrl);
  const databaseNumber = Number(url.pathname.slice(1) || 0);
  return {
    host: url.hostname.replace(/^\[|\]$/g, ''),
    port: Number(url.port || 6379),
    db: databaseNumber,
    ...(url.username && { username: decodeURIComponent(url.username) }),
    ...(url.password && { password: decodeURIComponent(url.password) }),
    ...(url.protocol === 'rediss:' && { tls: {} }),
  };
}
