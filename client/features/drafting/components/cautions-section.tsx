import { CAUTIONS, SELLER_CONFIRMATIONS } from '#shared/rules.ts';
import { FieldError } from '../../../components/ui/field.tsx';
import { Checkbox } from '../../../components/ui/inputs.tsx';
import { cautionsOfLot } from '../cautions-of-lot.ts';
import { fieldIdOf } from '../../../components/lot-form/field-ids.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { FormSection } from '../../../components/lot-form/form-section.tsx';

/** What to mind with this lot, and the seller's two confirmations. */
export function CautionsSection() {
  const { draft } = useDraftForm();
  return (
    <FormSection id="section-cautions" title="Cautions and title">
      <div>
        <ul className="flex max-w-prose list-disc flex-col gap-1.5 pl-5">
          {cautionsOfLot(draft).map((caution) => (
            <li key={caution}>{caution}</li>
          ))}
        </ul>
        <p className="mt-3 max-w-prose font-medium">{CAUTIONS.localRules}</p>
      </div>
      <Confirmation name="confirmsCautions" label={SELLER_CONFIRMATIONS.cautions} />
      <Confirmation name="confirmsTitle" label={SELLER_CONFIRMATIONS.title} />
    </FormSection>
  );
}

type ConfirmationProps = { name: 'confirmsCautions' | 'confirmsTitle'; label: string };

function Confirmation({ name, label }: ConfirmationProps) {
  const { draft, change, errorAt } = useDraftForm();
  const id = fieldIdOf(`/${name}`);
  const error = errorAt(`/${name}`);
  return (
    <div className={error && 'border-l-2 border-litharge pl-3'}>
      {error && <FieldError id={`${id}-error`}>{error}</FieldError>}
      <Checkbox
        id={id}
        label={label}
        checked={draft[name]}
        aria-required
        aria-invalid={error ? true : undefined}
        aria-describedby={error ? `${id}-error` : undefined}
        onChange={({ target: { checked } }) => change((before) => ({ ...before, [name]: checked }))}
      />
    </div>
  );
}
