import { Op } from 'sequelize';
import { AuditEntry } from '#server/models/audit-entry.ts';
import { Member } from '#server/models/member.ts';

export type AuditPage = { entries: AuditEntry[]; names: Map<string, string>; nextBefore: Date | null };

async function namesOf(entries: readonly AuditEntry[]): Promise<Map<string, string>> {
  const ids = entries.flatMap((entry) =>
    entry.subjectKind === 'member' ? [entry.actorId, entry.subjectId] : [entry.actorId],
  );
  const known = [...new Set(ids.filter((id): id is string => id !== null))];
  const members = await Member.findAll({ where: { id: known }, attributes: ['id', 'displayName'] });
  return new Map(members.map((member) => [member.id, member.displayName]));
}

/**
 * The trail, newest first, a page at a time. Pages are cut between two moments, never inside one, so that nothing is left
 * out where several acts share a millisecond.
 */
export async function auditPage(before: Date | null, limit: number): Promise<AuditPage> {
  const where = before === null ? {} : { at: { [Op.lt]: before } };
  const order: [string, string][] = [
    ['at', 'DESC'],
    ['id', 'DESC'],
  ];
  const found = await AuditEntry.findAll({ where, order, limit: limit + 1 });
  const last = found[limit - 1];
  if (found.length <= limit || last === undefined) {
    return { entries: found, names: await namesOf(found), nextBefore: null };
  }
  const earlier = found.filter((entry) => entry.at > last.at);
  const sameMoment = await AuditEntry.findAll({ where: { at: last.at }, order });
  const entries = [...earlier, ...sameMoment];
  return { entries, names: await namesOf(entries), nextBefore: last.at };
}
