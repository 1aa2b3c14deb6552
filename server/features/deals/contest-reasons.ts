import type { ContestKind } from '#shared/schemas/deals.ts';

export const CONTEST_REASON_LABELS: Readonly<Record<ContestKind, string>> = {
  not_arrived: 'Not arrived',
  wrong_mass: 'Wrong mass',
  wrong_metal: 'Wrong metal',
  damaged: 'Damaged',
  not_answered: 'Not answered in time',
};
