import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { METAL_NAMES, METALS } from '#shared/metals.ts';
import {
  BOUND_FIELDS,
  FORMS,
  GRADES,
  registerHref,
  SORTS,
  type RegisterFilters,
} from '../register-filters.ts';
import { FilterChoice } from './filter-choice.tsx';
import { RegisterBounds } from './register-bounds.tsx';
import { sortNames } from './register-words.ts';

type RegisterFilterBarProps = { filters: RegisterFilters };

/** What narrows the register; all of it lives in the address. */
export function RegisterFilterBar({ filters }: RegisterFilterBarProps) {
  const navigate = useNavigate();
  const hasBounds = BOUND_FIELDS.some((field) => filters[field] !== '') || filters.destination !== '';
  const [isOpen, setOpen] = useState(hasBounds);
  const href = (change: Partial<RegisterFilters>) => registerHref({ ...filters, ...change });
  return (
    <section aria-label="Narrow the register" className="no-print mb-5 flex flex-col gap-3">
      <div className="flex flex-wrap gap-x-7 gap-y-3">
        <FilterChoice
          label="Metal"
          choices={METALS.map((metal) => ({
            key: metal,
            text: (
              <abbr title={METAL_NAMES[metal]} className="no-underline">
                {metal}
              </abbr>
            ),
            isOn: filters.metal === metal,
            to: href({ metal: filters.metal === metal ? null : metal }),
          }))}
        />
        <FilterChoice
          label="Form"
          choices={FORMS.map((form) => ({
            key: form,
            text: form,
            isOn: filters.form === form,
            to: href({ form: filters.form === form ? null : form }),
          }))}
        />
        <FilterChoice
          label="Evidence"
          choices={GRADES.map((grade) => ({
            key: grade,
            text: grade,
            isOn: filters.grade === grade,
            to: href({ grade: filters.grade === grade ? null : grade }),
          }))}
        />
      </div>
      <details className="group" open={isOpen} onToggle={(event) => setOpen(event.currentTarget.open)}>
        <summary className="inline-block min-h-6 list-none py-1 text-note font-medium before:mr-2 before:font-mono before:content-['+'] hover:underline hover:underline-offset-4 group-open:before:content-['–'] [&::-webkit-details-marker]:hidden">
          Fineness, fine content, share of melt, destination
        </summary>
        <RegisterBounds
          key={registerHref({ ...filters, metal: null, form: null, grade: null, sort: 'newest' })}
          filters={filters}
          onApply={(next) => void navigate(registerHref(next), { preventScrollReset: true })}
        />
      </details>
      <FilterChoice
        label="In the order"
        choices={SORTS.map((sort) => ({
          key: sort,
          text: sortNames[sort],
          isOn: filters.sort === sort,
          to: href({ sort }),
        }))}
      />
    </section>
  );
}
