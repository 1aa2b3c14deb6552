import { UniqueConstraintError } from 'sequelize';
import type { LaboratoryRequest } from '#shared/schemas/desk.ts';
import { InvalidError, NotFoundError } from '#server/app-error.ts';
import { newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { recordAudit } from '#server/features/audit/record-audit.ts';
import { Laboratory } from '#server/models/laboratory.ts';
import type { Actor } from '#server/routing/define-route.ts';

async function refusingTwins<T>(save: () => Promise<T>): Promise<T> {
  try {
    return await save();
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw new InvalidError([
      {
        pointer: '/accreditationNumber',
        code: 'accreditation-taken',
        message: 'A laboratory with this accreditation is on the register already',
      },
    ]);
  }
}

/**
 * Puts a laboratory on the register. Body and number of the accreditation name it: no two rows share them.
 *
 * Throws `invalid-input` (`accreditation-taken`).
 */
export async function addLaboratory(input: LaboratoryRequest, unit: Unit, actor: Actor): Promise<Laboratory> {
  const laboratory = await refusingTwins(() =>
    Laboratory.create({ id: newId(), ...input }, { transaction: unit.tx }),
  );
  await recordAudit(
    {
      actor,
      act: 'add-laboratory',
      subjectKind: 'laboratory',
      subjectId: laboratory.id,
      detail: { ...input },
    },
    unit,
  );
  return laboratory;
}

function changesOf(
  laboratory: Laboratory,
  input: LaboratoryRequest,
): Record<string, { from: unknown; to: unknown }> {
  const names = Object.keys(input) as (keyof LaboratoryRequest)[];
  return Object.fromEntries(
    names
      .filter((name) => laboratory[name] !== input[name])
      .map((name) => [name, { from: laboratory[name], to: input[name] }]),
  );
}

/**
 * Changes a laboratory; the trail keeps what stood there before. Grades given earlier stay as they were given.
 *
 * Locks the row. Throws `not-found`, `invalid-input` (`accreditation-taken`).
 */
export async function changeLaboratory(
  { id, ...input }: LaboratoryRequest & { id: string },
  unit: Unit,
  actor: Actor,
): Promise<Laboratory> {
  const laboratory = await Laboratory.findByPk(id, { transaction: unit.tx, lock: unit.tx.LOCK.UPDATE });
  if (laboratory === null) throw new NotFoundError();
  const changes = changesOf(laboratory, input);
  await refusingTwins(() =>
    laboratory.update({ ...input, lockVersion: laboratory.lockVersion + 1 }, { transaction: unit.tx }),
  );
  await recordAudit(
    {
      actor,
      act: 'change-laboratory',
      subjectKind: 'laboratory',
      subjectId: id,
      detail: { name: input.name, changes },
    },
    unit,
  );
  return laboratory;
}
