import type { AuditAnswer } from '#shared/schemas/desk.ts';
import type { AuditEntry } from '#server/models/audit-entry.ts';
import type { AuditPage } from './audit-queries.ts';

/** The words by which a person knows the subject; its id where there are none. */
function subjectText(entry: AuditEntry, names: ReadonlyMap<string, string>): string {
  const { subjectKind, subjectId, detail } = entry;
  const said = detail as { lot?: unknown; name?: unknown; mail?: unknown };
  if (subjectKind === 'certificate' && typeof said.lot === 'string') return `certificate of lot ${said.lot}`;
  if (subjectKind === 'laboratory' && typeof said.name === 'string') return `laboratory ${said.name}`;
  if (subjectKind === 'mail' && typeof said.mail === 'string') return `mail ${said.mail}`;
  const name = subjectKind === 'member' ? names.get(subjectId) : undefined;
  return `${subjectKind.replaceAll('_', ' ')} ${name ?? subjectId}`;
}

export function presentAudit({ entries, names, nextBefore }: AuditPage): AuditAnswer {
  return {
    rows: entries.map((entry) => ({
      at: entry.at.toISOString(),
      who: entry.actorId === null ? 'the house' : (names.get(entry.actorId) ?? entry.actorId),
      role: entry.actorRole,
      act: entry.act,
      subject: subjectText(entry, names),
      detail: entry.detail as Record<string, unknown>,
    })),
    nextBefore: nextBefore?.toISOString() ?? null,
  };
}
