/** One DDL statement that may be run again: MariaDB commits DDL at once, so a migration killed half-way resumes here. */
export type MigrationStep = string;

export interface Migration {
  /** Date, number and subject; the same as its file's name. */
  readonly name: string;
  readonly steps: readonly MigrationStep[];
}
