import type { CONTEST_REASONS } from '#shared/schemas/deals.ts';

export type ContestReason = (typeof CONTEST_REASONS)[number];

export const CONTEST_REASON_LABELS: Readonly<Record<ContestReason, string>> = {
  not_arrived: 'Not arrived',
  wrong_mass: 'Wrong mass',
  wrong_metal: 'Wrong metal',
  damaged: 'Damaged',
};
