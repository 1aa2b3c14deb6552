import { UniqueConstraintError } from 'sequelize';
import { lotDraft, type LotDraft } from '#shared/schemas/lots.ts';
import { ConflictError, ForbiddenError, NotFoundError } from '#server/app-error.ts';
import { newCode, newId } from '#server/database/ids.ts';
import type { Unit } from '#server/database/transaction.ts';
import { Lot } from '#server/models/lot.ts';
import type { Actor } from '#server/routing/define-route.ts';
import { canDraftLots, canSeeLot, isSeller } from './lot-policy.ts';

const CODE_TRIES_MAX = 5;

async function draftToCopy(code: string, unit: Unit, actor: Actor): Promise<LotDraft> {
  const source = await Lot.findOne({ where: { code }, transaction: unit.tx });
  if (source === null || (!isSeller(actor, source) && !canSeeLot(actor, source))) throw new NotFoundError();
  if (!isSeller(actor, source)) throw new ForbiddenError();
  if (source.state === 'draft')
    throw new ConflictError('illegal-transition', 'This is still a draft itself.');
  // What was confirmed was confirmed of the other lot, and its closing day was the other's.
  return { ...lotDraft.parse(source.draft), confirmsCautions: false, confirmsTitle: false, closesOn: '' };
}

/**
 * Makes a draft of the actor's own: blank, or with what was typed for another lot of his; its photos are the caller's to add.
 * Anyone who may sell may draft; payout onboarding is asked for at submission.
 * Throws `forbidden`, `member-suspended`, `not-found` for a lot to copy that is not there,
 * `illegal-transition` for one that is a draft itself.
 */
export async function createDraft(
  { copyOf }: { copyOf?: string | undefined },
  unit: Unit,
  actor: Actor,
): Promise<Lot> {
  if (actor.suspendedAt !== null) throw new ForbiddenError('member-suspended');
  if (!canDraftLots(actor)) throw new ForbiddenError();
  const draft = copyOf === undefined ? lotDraft.parse({}) : await draftToCopy(copyOf, unit, actor);
  for (let tries = 1; ; tries += 1) {
    try {
      return await Lot.create(
        {
          id: newId(),
          code: newCode('S'),
          sellerId: actor.id,
          state: 'draft',
          draft,
          region: actor.region,
          destinations: [],
        },
        { transaction: unit.tx },
      );
    } catch (error) {
      const isTaken = error instanceof UniqueConstraintError && 'lots_code' in error.fields;
      if (!isTaken || tries >= CODE_TRIES_MAX) throw error;
    }
  }
}
