import { elementName, isMetal, isOtherElement } from '#shared/metals.ts';
import type { DraftCertificate } from '#shared/schemas/lots.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Fieldset } from '../../../components/ui/field.tsx';
import { fieldIdOf } from '../../../components/lot-form/field-ids.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { ResultFields } from '../../../components/lot-form/result-fields.tsx';

type Results = DraftCertificate['results'];
type ReportResultsProps = { report: DraftCertificate; onChange: (results: Results) => void };

const ROWS_MAX = 20;
const blank = (): Results[number] => ({
  element: '',
  fineness: { value: '', unit: 'permille' },
  uncertainty: { value: '', unit: 'permille' },
  method: '',
});
const nameOf = (symbol: string, at: number) =>
  isMetal(symbol) || isOtherElement(symbol) ? elementName(symbol) : `Result ${at + 1}`;

/** The figures that stand on the report, metal by metal. */
export function ReportResults({ report, onChange }: ReportResultsProps) {
  const { draft, errorAt } = useDraftForm();
  const { results } = report;
  const assay = draft.contents.filter((row) => row.metal !== '');
  const copy = () =>
    onChange(
      assay.map(({ metal, fineness, uncertainty, method }) => ({
        element: metal,
        fineness,
        uncertainty,
        method,
      })),
    );
  return (
    <Fieldset
      id={fieldIdOf('/certificate/results')}
      legend="Results on the report"
      hint="Compare each figure with the paper before you take the lot’s over: a slip here comes back from the desk."
      error={errorAt('/certificate/results')}
    >
      <ol className="mt-2 flex flex-col gap-4">
        {results.map((row, at) => {
          const name = nameOf(row.element, at);
          return (
            <li key={at} className="sheet p-4">
              <ResultFields
                pointer={`/certificate/results/${at}`}
                elementKey="element"
                name={`${name} on the report`}
                row={row}
                onChange={(next) => onChange(results.map((other, index) => (index === at ? next : other)))}
              />
              <Button
                look="quiet"
                className="-ml-2 mt-2"
                onClick={() => onChange(results.filter((_, index) => index !== at))}
              >
                Remove {name.toLowerCase()} from the report
              </Button>
            </li>
          );
        })}
      </ol>
      <div className="mt-3 flex flex-wrap gap-3">
        <Button look="second" disabled={assay.length === 0} onClick={copy}>
          Same results as the lot
        </Button>
        <Button
          look="second"
          disabled={results.length >= ROWS_MAX}
          onClick={() => onChange([...results, blank()])}
        >
          Add a result
        </Button>
      </div>
    </Fieldset>
  );
}
