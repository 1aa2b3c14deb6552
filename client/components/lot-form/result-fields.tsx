import { ASSAY_METHODS, isAssayMethodKey, isOutsideRange } from '#shared/assay/methods.ts';
import type { TypedQuantity } from '#shared/lot-contents.ts';
import { isMetal, METAL_NAMES } from '#shared/metals.ts';
import { THIN } from '../../lib/format.ts';
import { finenessBeside, permilleTyped } from './figures-beside.ts';
import { ChoiceField } from './choice-field.tsx';
import { QuantityField } from './quantity-field.tsx';
import { elementOptions, finenessUnits, methodOptions, metalOptions } from './unit-options.ts';

export type ResultRow = {
  element: string;
  fineness: TypedQuantity;
  uncertainty: TypedQuantity;
  method: string;
};

type ResultFieldsProps = {
  pointer: string;
  /** What the draft calls the element at this place. */
  elementKey: 'metal' | 'element';
  name: string;
  row: ResultRow;
  onChange: (row: ResultRow) => void;
};

const groups = [
  { label: 'Quoted', options: metalOptions },
  { label: 'Only found', options: elementOptions },
];

/** One metal of an assay or a report: which, how fine, how sure, by which method. */
export function ResultFields({ pointer, elementKey, name, row, onChange }: ResultFieldsProps) {
  return (
    <div className="grid grid-cols-1 items-start gap-x-5 gap-y-4 sm:grid-cols-2">
      <ChoiceField
        pointer={`${pointer}/${elementKey}`}
        label="Metal"
        blank="Choose a metal"
        groups={groups}
        value={row.element}
        onChange={(element) => onChange({ ...row, element })}
      />
      <ChoiceField
        pointer={`${pointer}/method`}
        label="Method"
        blank="No method named"
        optional
        options={methodOptions}
        value={row.method === 'none' ? '' : row.method}
        onChange={(method) => onChange({ ...row, method })}
        beside={<MethodRemark row={row} />}
      />
      <QuantityField
        pointer={`${pointer}/fineness`}
        label="Fineness"
        unitLabel={`Unit of the fineness, ${name}`}
        units={finenessUnits}
        value={row.fineness}
        beside={finenessBeside(row.fineness)}
        onChange={(fineness) => onChange({ ...row, fineness })}
      />
      <QuantityField
        pointer={`${pointer}/uncertainty`}
        label="Expanded uncertainty (k = 2)"
        unitLabel={`Unit of the uncertainty, ${name}`}
        units={finenessUnits}
        optional
        value={row.uncertainty}
        remark={row.uncertainty.value === '' && `left out: ${assumed(row.method)} is assumed`}
        onChange={(uncertainty) => onChange({ ...row, uncertainty })}
      />
    </div>
  );
}

function assumed(method: string): string {
  const known = isAssayMethodKey(method) ? method : 'none';
  return `±${THIN}${ASSAY_METHODS[known].defaultExpandedPermille}${THIN}‰`;
}

/** Plausibility stands beside the figure, never instead of it. */
function MethodRemark({ row: { element, fineness, method } }: { row: ResultRow }) {
  if (!isAssayMethodKey(method) || !isMetal(element)) return null;
  const permille = permilleTyped(fineness);
  if (permille && isOutsideRange(method, element, permille)) {
    return `This method is not meant for ${METAL_NAMES[element].toLowerCase()} of this fineness; the desk will ask.`;
  }
  return ASSAY_METHODS[method].isSurfaceOnly ? 'This method sees the surface only.' : null;
}
