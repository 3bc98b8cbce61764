import type { MigrationStep } from '../migration.ts';

export const name = '20261201-0002-workers';

export const steps: readonly MigrationStep[] = [
  // Which workers are alive, for readiness; a row is the last sign of life, in database time.
  `CREATE TABLE IF NOT EXISTS worker_heartbeats (
     id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
     thread_count SMALLINT UNSIGNED NOT NULL,
     started_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
     seen_at DATETIME(3) NOT NULL DEFAULT CURRENT_TIMESTAMP(3),
     KEY worker_heartbeats_seen (seen_at)
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
  // When a bench last had its turn, so that benches with equally many running recordings alternate
  `CREATE TABLE IF NOT EXISTS bench_turns (
     bench_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin PRIMARY KEY,
     served_at DATETIME(3) NOT NULL,
     FOREIGN KEY (bench_id) REFERENCES benches (id) ON DELETE CASCADE
   ) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4 COLLATE=utf8mb4_unicode_ci`,
];
