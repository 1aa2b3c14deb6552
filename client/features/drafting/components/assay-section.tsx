import { elementName, isMetal, isOtherElement } from '#shared/metals.ts';
import type { DraftContent } from '#shared/schemas/lots.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Fieldset } from '../../../components/ui/field.tsx';
import { Checkbox } from '../../../components/ui/inputs.tsx';
import { fieldIdOf } from '../../../components/lot-form/field-ids.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { blankContent } from '../starting-draft.ts';
import { FormSection } from '../../../components/lot-form/form-section.tsx';
import { ResultFields } from '../../../components/lot-form/result-fields.tsx';

const ROWS_MAX = 20;

const nameOf = (symbol: string, at: number) =>
  isMetal(symbol) || isOtherElement(symbol) ? elementName(symbol) : `Metal ${at + 1}`;

/** What the metal is made of: a row for each metal, paid for or only found. */
export function AssaySection() {
  const { draft, change, errorAt } = useDraftForm();
  const rows = draft.contents;
  const put = (contents: DraftContent[]) => change((before) => ({ ...before, contents }));
  const add = (paidFor: boolean) => {
    put([...rows, blankContent(paidFor)]);
    const id = fieldIdOf(`/contents/${rows.length}/metal`);
    requestAnimationFrame(() => document.getElementById(id)?.focus());
  };
  return (
    <FormSection
      id="section-assay"
      title="Assay"
      sub="The mass fractions that the price rests on, as the certificate states them."
    >
      <Fieldset
        id={fieldIdOf('/contents')}
        legend={<span className="sr-only">Metals and elements</span>}
        error={errorAt('/contents')}
      >
        <ol className="flex flex-col gap-4">
          {rows.map((row, at) => (
            <li key={at}>
              <ContentRow
                row={row}
                at={at}
                name={nameOf(row.metal, at)}
                onChange={(next) => put(rows.map((other, index) => (index === at ? next : other)))}
                onRemove={rows.length > 1 ? () => put(rows.filter((_, index) => index !== at)) : null}
              />
            </li>
          ))}
        </ol>
      </Fieldset>
      <div className="flex flex-wrap gap-3">
        <Button look="second" disabled={rows.length >= ROWS_MAX} onClick={() => add(true)}>
          Add a metal paid for
        </Button>
        <Button look="second" disabled={rows.length >= ROWS_MAX} onClick={() => add(false)}>
          Add an element also found
        </Button>
      </div>
    </FormSection>
  );
}

type ContentRowProps = {
  row: DraftContent;
  at: number;
  name: string;
  onChange: (row: DraftContent) => void;
  onRemove: (() => void) | null;
};

function ContentRow({ row, at, name, onChange, onRemove }: ContentRowProps) {
  const { errorAt } = useDraftForm();
  const pointer = `/contents/${at}`;
  const error = errorAt(`${pointer}/paidFor`);
  const canBePaid = row.metal === '' || isMetal(row.metal);
  return (
    <fieldset className="sheet min-w-0 p-4">
      <legend className="sr-only">{name}</legend>
      <ResultFields
        pointer={pointer}
        elementKey="metal"
        name={name}
        row={{ ...row, element: row.metal }}
        onChange={({ element, ...rest }) =>
          onChange({
            ...row,
            ...rest,
            metal: element,
            paidFor: row.paidFor && !isOtherElement(element),
          })
        }
      />
      <div className="mt-4 flex flex-wrap items-center justify-between gap-3">
        {canBePaid ? (
          <Checkbox
            id={fieldIdOf(`${pointer}/paidFor`)}
            label={`Paid for${row.metal === '' ? '' : `: ${name.toLowerCase()} counts in the price`}`}
            checked={row.paidFor}
            aria-invalid={error ? true : undefined}
            onChange={(event) => onChange({ ...row, paidFor: event.target.checked })}
          />
        ) : (
          <p className="text-note text-ink-2">
            Found beside the metals paid for; never counted in the price.
          </p>
        )}
        {onRemove && (
          <Button look="quiet" onClick={onRemove}>
            Remove {name.toLowerCase()}
          </Button>
        )}
      </div>
    </fieldset>
  );
}
