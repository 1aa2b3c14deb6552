import type { ReactNode } from 'react';
import { cx } from '../../lib/cx.ts';

/** What a control needs to be tied to its label, hint and error; spread it onto the control. */
export type ControlTies = {
  id: string;
  'aria-describedby'?: string;
  'aria-invalid'?: true;
  'aria-required'?: true;
};

type FieldProps = {
  id: string;
  label: ReactNode;
  hint?: ReactNode;
  error?: string | undefined;
  /** Most fields are needed; the few that are not say so. */
  optional?: boolean;
  /** Stands under the control and is read with it: the same figure in other units, a count of characters. */
  beside?: ReactNode;
  className?: string;
  children: (ties: ControlTies) => ReactNode;
};

/** Label above, hint, error before the control, all tied to it. */
export function Field({ id, label, hint, error, optional = false, beside, className, children }: FieldProps) {
  const described = [hint && `${id}-hint`, error && `${id}-error`, beside && `${id}-beside`]
    .filter(Boolean)
    .join(' ');
  const ties: ControlTies = { id };
  if (described) ties['aria-describedby'] = described;
  if (error) ties['aria-invalid'] = true;
  if (!optional) ties['aria-required'] = true;
  return (
    <div className={cx('flex flex-col gap-1', error && 'border-l-2 border-litharge pl-3', className)}>
      <label htmlFor={id} className="font-medium">
        {label}
        {optional && (
          <>
            {' '}
            <span className="font-normal text-ink-2">(may be left out)</span>
          </>
        )}
      </label>
      {hint && (
        <p id={`${id}-hint`} className="max-w-prose text-note text-ink-2">
          {hint}
        </p>
      )}
      {error && <FieldError id={`${id}-error`}>{error}</FieldError>}
      {children(ties)}
      {beside && (
        <div id={`${id}-beside`} className="text-note text-ink-2">
          {beside}
        </div>
      )}
    </div>
  );
}

type FieldErrorProps = { id: string; children: ReactNode };

export function FieldError({ id, children }: FieldErrorProps) {
  return (
    <p id={id} className="flex gap-1.5 font-medium text-litharge">
      <svg
        viewBox="0 0 12 12"
        className="mt-1 size-3.5 shrink-0"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.5"
        aria-hidden="true"
      >
        <path d="M6 1 11.2 10.5H.8zM6 4.5v3M6 8.6v.6" />
      </svg>
      <span>{children}</span>
    </p>
  );
}

type FieldsetProps = {
  id: string;
  legend: ReactNode;
  hint?: ReactNode;
  error?: string | undefined;
  children: ReactNode;
  className?: string;
};

/** A question that several controls answer together. */
export function Fieldset({ id, legend, hint, error, children, className }: FieldsetProps) {
  const described = [hint && `${id}-hint`, error && `${id}-error`].filter(Boolean).join(' ');
  return (
    <fieldset
      id={id}
      tabIndex={-1}
      aria-describedby={described || undefined}
      className={cx('min-w-0', error && 'border-l-2 border-litharge pl-3', className)}
    >
      <legend className="float-left mb-1 w-full font-medium">{legend}</legend>
      <div className="clear-both flex flex-col gap-1">
        {hint && (
          <p id={`${id}-hint`} className="max-w-prose text-note text-ink-2">
            {hint}
          </p>
        )}
        {error && <FieldError id={`${id}-error`}>{error}</FieldError>}
        {children}
      </div>
    </fieldset>
  );
}
