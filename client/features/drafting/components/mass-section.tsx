import { useReader } from '../../../lib/reader-context.ts';
import { massBeside } from '../../../components/lot-form/figures-beside.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { FormSection } from '../../../components/lot-form/form-section.tsx';
import { QuantityField } from '../../../components/lot-form/quantity-field.tsx';
import { massUnits } from '../../../components/lot-form/unit-options.ts';

/** What the balance said, and how finely it can tell. */
export function MassSection() {
  const { draft, change } = useDraftForm();
  const { weightUnit } = useReader();
  return (
    <FormSection
      id="section-mass"
      title="Mass"
      sub="Weigh it clean and dry. Type every digit that the balance shows, zeros at the end too."
    >
      <div className="grid grid-cols-1 items-start gap-6 sm:grid-cols-2">
        <QuantityField
          pointer="/gross"
          label="Gross mass"
          unitLabel="Unit of the gross mass"
          units={massUnits}
          value={draft.gross}
          beside={massBeside(draft.gross, weightUnit)}
          onChange={(gross) =>
            change((before) => ({
              ...before,
              gross,
              readability:
                before.readability.value === '' ? { value: '', unit: gross.unit } : before.readability,
            }))
          }
        />
        <QuantityField
          pointer="/readability"
          label="Readability of the balance"
          unitLabel="Unit of the readability"
          units={massUnits}
          optional
          value={draft.readability}
          remark={draft.readability.value === '' && 'left out: one unit of the last digit typed is assumed'}
          onChange={(readability) => change((before) => ({ ...before, readability }))}
        />
      </div>
    </FormSection>
  );
}
