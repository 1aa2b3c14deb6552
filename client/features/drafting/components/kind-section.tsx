import { DESCRIPTION_LENGTH_MAX, TITLE_LENGTH_MAX } from '#shared/limits.ts';
import { isMetal, type Metal } from '#shared/metals.ts';
import { REFINED_FORMS } from '#shared/schemas/lots.ts';
import { formName } from '../../../components/figures/lot-words.tsx';
import { SpecimenDrawing } from '../../../components/figures/specimen-drawing.tsx';
import { Field, Fieldset } from '../../../components/ui/field.tsx';
import { Textarea, TextInput } from '../../../components/ui/inputs.tsx';
import { fieldIdOf } from '../../../components/lot-form/field-ids.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { FormSection } from '../../../components/lot-form/form-section.tsx';

const meanings: Record<(typeof REFINED_FORMS)[number], string> = {
  button: 'One piece as it solidified in the crucible or cone',
  bar: 'One cast or rolled piece with flat faces',
  grain: 'Poured into water, or cut; many small pieces',
};

/** What the lot is: its form, its title, its description. */
export function KindSection() {
  const { draft, change, errorAt } = useDraftForm();
  return (
    <FormSection id="section-kind" title="What it is">
      <FormCards />
      <Field
        id={fieldIdOf('/title')}
        label="Title"
        hint="As it stands in the register: “Gold button, cone mould, single melt”."
        error={errorAt('/title')}
      >
        {(ties) => (
          <TextInput
            {...ties}
            maxLength={TITLE_LENGTH_MAX}
            value={draft.title}
            onChange={(event) => change((before) => ({ ...before, title: event.target.value }))}
          />
        )}
      </Field>
      <Field
        id={fieldIdOf('/description')}
        label="Description"
        optional
        hint="Where the metal comes from, how often it was melted, what a buyer would ask. No address and no telephone number."
        error={errorAt('/description')}
      >
        {(ties) => (
          <Textarea
            {...ties}
            rows={5}
            maxLength={DESCRIPTION_LENGTH_MAX}
            value={draft.description}
            onChange={(event) => change((before) => ({ ...before, description: event.target.value }))}
          />
        )}
      </Field>
    </FormSection>
  );
}

function FormCards() {
  const { draft, change, errorAt } = useDraftForm();
  const main = draft.contents.find((row) => row.paidFor && isMetal(row.metal))?.metal as Metal | undefined;
  const id = fieldIdOf('/form');
  return (
    <Fieldset id={id} legend="Form" error={errorAt('/form')}>
      <div className="mt-1 grid gap-3 sm:grid-cols-3">
        {REFINED_FORMS.map((form) => (
          <label
            key={form}
            className="relative flex cursor-pointer items-center gap-4 rounded-box border border-line bg-sheet p-3 has-checked:border-verdigris has-checked:bg-wash has-checked:shadow-[inset_0_0_0_1px_var(--verdigris)] has-focus-visible:outline-2 has-focus-visible:outline-offset-2 has-focus-visible:outline-verdigris sm:flex-col sm:items-start"
          >
            <SpecimenDrawing
              form={form}
              metal={main ?? 'Au'}
              label={null}
              className="w-24 shrink-0 sm:w-full"
            />
            <span className="flex gap-3">
              <input
                type="radio"
                name="lot-form"
                value={form}
                checked={draft.form === form}
                onChange={() => change((before) => ({ ...before, form }))}
                aria-describedby={`${id}-${form}-note`}
                className="mt-0.5 size-5 shrink-0 accent-verdigris"
              />
              <span>
                <span className="inline-block font-medium first-letter:uppercase">{formName(form)}</span>
                <span id={`${id}-${form}-note`} className="block text-note text-ink-2">
                  {meanings[form]}
                </span>
              </span>
            </span>
          </label>
        ))}
      </div>
    </Fieldset>
  );
}
