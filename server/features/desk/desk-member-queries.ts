import { Op } from 'sequelize';
import { Member } from '#server/models/member.ts';

const FOUND_MAX = 50;

const escapeLike = (text: string) => text.replace(/[\\%_]/gu, (sign) => `\\${sign}`);

/** Members by a part of their name or their whole e-mail address; without a text, those who are suspended. */
export async function searchMembers(text: string): Promise<Member[]> {
  const where =
    text === ''
      ? { suspendedAt: { [Op.ne]: null } }
      : {
          [Op.or]: [{ displayName: { [Op.like]: `%${escapeLike(text)}%` } }, { email: text.toLowerCase() }],
        };
  return Member.findAll({
    where,
    order: [
      ['displayName', 'ASC'],
      ['id', 'ASC'],
    ],
    limit: FOUND_MAX,
  });
}
