import { Sequelize } from 'sequelize';
import { settings } from '../env.ts';
import { refuseUnscopedStatement } from './tenancy.ts';

const POOL_MAXIMUM_COUNT = 10;
const POOL_WAIT_MILLISECONDS = 2000;
const CONNECT_TIMEOUT_MILLISECONDS = 2000;
const STATEMENT_LIMIT_SECONDS = 20;
const LOCK_WAIT_LIMIT_SECONDS = 4;

function createDatabase(): Sequelize {
  const url = new URL(settings().databaseUrl);
  return new Sequelize({
    dialect: 'mariadb',
    host: url.hostname,
    port: Number(url.port || 3306),
    username: decodeURIComponent(url.username),
    password: decodeURIComponent(url.password),
    database: url.pathname.slice(1),
    timezone: '+00:00',
    define: { underscored: true, charset: 'utf8mb4' },
    isolationLevel: 'READ COMMITTED',
    pool: { max: POOL_MAXIMUM_COUNT, min: 0, acquire: POOL_WAIT_MILLISECONDS, idle: 10_000 },
    dialectOptions: {
      connectTimeout: CONNECT_TIMEOUT_MILLISECONDS,
      initSql: [
        `SET SESSION max_statement_time = ${String(STATEMENT_LIMIT_SECONDS)}`,
        `SET SESSION innodb_lock_wait_timeout = ${String(LOCK_WAIT_LIMIT_SECONDS)}`,
      ],
    },
    logging: refuseUnscopedStatement,
  });
}

/** The connection pool of this process. Nothing connects before the first statement. */
export const database: Sequelize = createDatabase();
