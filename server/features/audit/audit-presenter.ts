import type { AuditAnswer } from '#shared/schemas/desk.ts';
import type { AuditPage } from './audit-queries.ts';

function subjectText(kind: string, id: string, names: ReadonlyMap<string, string>): string {
  const name = kind === 'member' ? names.get(id) : undefined;
  return `${kind.replaceAll('_', ' ')} ${name ?? id}`;
}

export function presentAudit({ entries, names, nextBefore }: AuditPage): AuditAnswer {
  return {
    rows: entries.map((entry) => ({
      at: entry.at.toISOString(),
      who: entry.actorId === null ? 'the house' : (names.get(entry.actorId) ?? entry.actorId),
      role: entry.actorRole,
      act: entry.act,
      subject: subjectText(entry.subjectKind, entry.subjectId, names),
      detail: entry.detail as Record<string, unknown>,
    })),
    nextBefore: nextBefore?.toISOString() ?? null,
  };
}
