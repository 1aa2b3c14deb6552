import { createContext, useContext } from 'react';
import type { LotDraft } from '#shared/schemas/lots.ts';

/** The draft as the sections of its form see it. */
export type DraftForm = {
  code: string;
  draft: LotDraft;
  change: (step: (before: LotDraft) => LotDraft) => void;
  errorAt: (pointer: string) => string | undefined;
};

export const DraftFormContext = createContext<DraftForm | null>(null);

export function useDraftForm(): DraftForm {
  const form = useContext(DraftFormContext);
  if (!form) throw new Error('A section of the lot form stands inside the form.');
  return form;
}
