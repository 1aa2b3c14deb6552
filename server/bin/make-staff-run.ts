import '#server/models/index.ts';
import { ROLES, roleSchema } from '#shared/roles.ts';
import { AppError } from '#server/app-error.ts';
import { sequelize } from '#server/database/connection.ts';
import { withTransaction } from '#server/database/transaction.ts';
import { findMemberByEmail } from '#server/features/members/member-queries.ts';
import { setRole } from '#server/features/members/set-role.ts';

function fail(message: string): void {
  process.stderr.write(`${message}\n`);
  process.exitCode = 1;
}

async function makeStaff(email: string, roleText: string): Promise<void> {
  const role = roleSchema.safeParse(roleText).data;
  if (role === undefined) return fail(`Which role? One of: ${ROLES.join(', ')}`);
  const member = await findMemberByEmail(email);
  if (member === null) return fail(`${email} has no account yet: sign up first.`);
  try {
    await withTransaction({ members: [member.id] }, (unit) =>
      setRole({ memberId: member.id, role }, unit, null),
    );
    process.stdout.write(`${email}: ${member.role} → ${role}\n`);
  } catch (error) {
    if (!(error instanceof AppError)) throw error;
    fail(error.message);
  }
}

await makeStaff(process.argv[2] ?? '', process.argv[3] ?? '');
await sequelize.close();
