import { Stamp } from '../ui/stamp.tsx';

export const lotForms = [
  'button',
  'bar',
  'grain',
  'karat_scrap',
  'plated_scrap',
  'e_scrap',
  'sweeps',
] as const;
export type LotForm = (typeof lotForms)[number];

export type EvidenceGrade = 'certified' | 'examined' | 'declared';

const formNames: Record<LotForm, string> = {
  button: 'button',
  bar: 'bar',
  grain: 'grain',
  karat_scrap: 'karat scrap',
  plated_scrap: 'plated scrap',
  e_scrap: 'e-scrap',
  sweeps: 'sweeps',
};

const grades: Record<EvidenceGrade, { tone: 'good' | 'plain'; meaning: string }> = {
  certified: {
    tone: 'good',
    meaning: 'An accredited laboratory’s certificate, compared and confirmed by the desk',
  },
  examined: { tone: 'plain', meaning: 'Other evidence, looked at by the desk' },
  declared: { tone: 'plain', meaning: 'The seller’s word' },
};

export function formName(form: LotForm): string {
  return formNames[form];
}

export function gradeMeaning(grade: EvidenceGrade): string {
  return grades[grade].meaning;
}

/** How well a fineness is attested, in one word that somebody answers for. */
export function GradeStamp({ grade }: { grade: EvidenceGrade }) {
  return (
    <span title={grades[grade].meaning}>
      <Stamp tone={grades[grade].tone}>{grade}</Stamp>
    </span>
  );
}
