import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { AuditEntry } from '#server/models/audit-entry.ts';
import type { StoredFile } from '#server/models/stored-file.ts';

const ACT = 'report-missing-file';

/**
 * Tells the admins by the audit trail that a file's row stands for bytes that are not there; once a file, however often
 * they are looked for. The row stays: what it says of the document is still true. Answers whether it was told now.
 */
export async function reportMissingFile(
  { file, missing }: { file: StoredFile; missing: readonly string[] },
  unit: Unit,
): Promise<boolean> {
  const subject = { subjectKind: 'file', subjectId: file.id } as const;
  const told = await AuditEntry.count({ where: { act: ACT, ...subject }, transaction: unit.tx });
  if (told > 0) return false;
  const detail = { kind: file.kind, name: file.originalName, missing: [...missing] };
  await recordAudit({ actor: null, act: ACT, ...subject, detail }, unit);
  return true;
}
