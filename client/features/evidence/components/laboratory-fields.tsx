import { useQuery } from '@tanstack/react-query';
import type { DraftCertificate } from '#shared/schemas/lots.ts';
import { formatDate } from '../../../lib/format.ts';
import { laboratoriesQuery } from '../api/laboratories-query.ts';
import { ChoiceField } from '../../../components/lot-form/choice-field.tsx';
import { TextField } from '../../../components/lot-form/text-field.tsx';

type LaboratoryFieldsProps = {
  report: DraftCertificate;
  onChange: (part: Partial<DraftCertificate>) => void;
};

/** Who signed the report: from the register, or by name. */
export function LaboratoryFields({ report, onChange }: LaboratoryFieldsProps) {
  const { data } = useQuery(laboratoriesQuery);
  const laboratories = data?.laboratories ?? [];
  const chosen = laboratories.find((laboratory) => laboratory.id === report.laboratoryId);
  return (
    <div className="grid grid-cols-1 items-start gap-x-5 gap-y-6 sm:grid-cols-2">
      <ChoiceField
        pointer="/certificate/laboratory"
        label="Laboratory"
        blank="Not on the register: I type its name"
        options={laboratories.map(({ id, name, region }) => ({ value: id, label: `${name}, ${region}` }))}
        value={report.laboratoryId ?? ''}
        onChange={(id) => {
          const found = laboratories.find((laboratory) => laboratory.id === id);
          onChange({ laboratoryId: found?.id ?? null, laboratoryName: found?.name ?? '' });
        }}
        beside={
          chosen
            ? `${chosen.accreditationBody} ${chosen.accreditationNumber}, valid until ${formatDate(chosen.validUntil)}`
            : 'Only a laboratory of the register makes a lot certified.'
        }
      />
      {!report.laboratoryId && (
        <TextField pointer="/certificate/laboratoryName" label="Name of the laboratory" maxLength={120} />
      )}
      <TextField pointer="/certificate/number" label="Report number" maxLength={60} />
    </div>
  );
}
