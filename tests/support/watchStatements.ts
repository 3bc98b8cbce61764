import { database } from '#server/database/connection.ts';

/** Sequelize keeps its options out of its types. */
const { options } = database as unknown as { options: { logging: (statement: string) => void } };

/**
 * Shows every statement of this process to `watch` before it runs; what that throws, the statement fails with.
 *
 * @returns a function that ends the watch
 */
export function watchStatements(watch: (statement: string) => void): () => void {
  const { logging } = options;
  options.logging = watch;
  return () => {
    options.logging = logging;
  };
}
