import type { Transaction } from 'sequelize';
import { AuditEntry } from '../models/AuditEntry.ts';
import { requestContext } from '../requestContext.ts';

/** One line of the audit log. Never holds a secret, nor what a person wrote. */
export interface AuditLine {
  /** Noun and past verb, e.g. `build.created`. */
  readonly action: string;
  readonly accountId: string | null;
  readonly benchId?: string;
  readonly object?: { readonly type: string; readonly id: string };
  readonly details?: Readonly<Record<string, string | number | boolean | null>>;
}

/** Appends to the audit log, inside the transaction of the act that it tells of. */
export async function audit(line: AuditLine, transaction?: Transaction): Promise<void> {
  await AuditEntry.create(
    {
      action: line.action,
      actorAccountId: line.accountId,
      benchId: line.benchId ?? null,
      objectType: line.object?.type ?? null,
      objectId: line.object?.id ?? null,
      details: line.details ?? {},
      requestId: requestContext.requestId(),
    },
    { transaction: transaction ?? null },
  );
}
