import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import type { Actor } from '#server/routing/define-route.ts';

export const AUDIT_SUBJECTS = [
  'certificate',
  'lot',
  'deal',
  'member',
  'laboratory',
  'quote',
  'fee_schedule',
  'file',
  'mail',
] as const;
export type AuditSubject = (typeof AUDIT_SUBJECTS)[number];

export type AuditRecord = {
  /** Who did it; null for the house itself: a job, or a command at the machine. */
  actor: Pick<Actor, 'id' | 'role'> | null;
  /** Kebab-case, a verb and what it was done to, such as `pull-lot`. */
  act: string;
  subjectKind: AuditSubject;
  /** The public code of a lot or deal, else the row's id. */
  subjectId: string;
  detail?: Readonly<Record<string, unknown>>;
};

/**
 * Writes one line of the audit trail in the transaction of the act itself, so that neither exists without the other. The
 * application's database user can add lines but neither change nor remove them.
 */
export async function recordAudit(record: AuditRecord, unit: Unit): Promise<void> {
  const { actor, act, subjectKind, subjectId, detail = {} } = record;
  await AuditEntry.create(
    {
      id: newId(),
      actorId: actor?.id ?? null,
      actorRole: actor?.role ?? 'house',
      act,
      subjectKind,
      subjectId,
      at: unit.now,
      detail,
    },
    { transaction: unit.tx },
  );
}
