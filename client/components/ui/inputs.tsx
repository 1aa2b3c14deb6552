import type { ComponentProps, ReactNode } from 'react';
import { cx } from '../../lib/cx.ts';

const box =
  'min-h-10 w-full min-w-0 rounded-box border border-line bg-sheet px-3 py-2 text-ink ' +
  'aria-invalid:border-2 aria-invalid:border-litharge disabled:border-dashed disabled:text-ink-2 [&[readonly]]:bg-paper';

const tick =
  'relative mt-px size-6 shrink-0 appearance-none border border-line bg-sheet checked:border-verdigris ' +
  'checked:bg-verdigris before:absolute before:hidden before:bg-sheet checked:before:block disabled:border-dashed';
const boxTick =
  'rounded-box before:inset-1 before:[clip-path:polygon(12%_52%,0_64%,38%_98%,100%_18%,86%_6%,37%_74%)]';
const dotTick = 'rounded-[50%] before:inset-[7px] before:rounded-[50%]';

export function TextInput({ className, type = 'text', ...rest }: ComponentProps<'input'>) {
  return <input {...rest} type={type} className={cx(box, className)} />;
}

type NumberInputProps = ComponentProps<'input'> & { unit?: ReactNode };

/** Figures are typed as text: a number input would drop digits, swallow a comma and change by the mouse wheel. */
export function NumberInput({ className, unit, ...rest }: NumberInputProps) {
  const input = (
    <input
      autoComplete="off"
      {...rest}
      type="text"
      inputMode="decimal"
      className={cx(box, 'font-mono text-right', className)}
    />
  );
  if (!unit) return input;
  return (
    <span className="flex items-center gap-2">
      {input}
      <span className="shrink-0 text-ink-2">{unit}</span>
    </span>
  );
}

export function Select({ className, ...rest }: ComponentProps<'select'>) {
  return <select {...rest} className={cx(box, 'pr-8', className)} />;
}

export function Textarea({ className, rows = 4, ...rest }: ComponentProps<'textarea'>) {
  return <textarea {...rest} rows={rows} className={cx(box, 'resize-y', className)} />;
}

type CheckboxProps = Omit<ComponentProps<'input'>, 'type'> & { label: ReactNode; hint?: ReactNode };

export function Checkbox({
  label,
  hint,
  id,
  className,
  'aria-describedby': describedBy,
  ...rest
}: CheckboxProps) {
  const hintId = hint && id ? `${id}-note` : undefined;
  const described = [describedBy, hintId].filter(Boolean).join(' ') || undefined;
  return (
    <div className={cx('flex gap-3', className)}>
      <input {...rest} id={id} type="checkbox" aria-describedby={described} className={cx(tick, boxTick)} />
      <div>
        <label htmlFor={id}>{label}</label>
        {hint && (
          <p id={hintId} className="max-w-prose text-note text-ink-2">
            {hint}
          </p>
        )}
      </div>
    </div>
  );
}

export type RadioOption = { value: string; label: ReactNode; hint?: ReactNode };

type RadioGroupProps = Omit<ComponentProps<'input'>, 'type' | 'id' | 'value'> & {
  id: string;
  options: RadioOption[];
  value?: string;
  inline?: boolean;
};

/** Goes inside a Fieldset, which asks the question. */
export function RadioGroup({ id, options, value, inline = false, ...rest }: RadioGroupProps) {
  return (
    <div className={cx('flex gap-x-6 gap-y-2', inline ? 'flex-row flex-wrap' : 'flex-col')}>
      {options.map((option) => (
        <div key={option.value} className="flex gap-3">
          <input
            {...rest}
            {...(value === undefined ? {} : { checked: value === option.value })}
            id={`${id}-${option.value}`}
            type="radio"
            value={option.value}
            aria-describedby={option.hint ? `${id}-${option.value}-note` : undefined}
            className={cx(tick, dotTick)}
          />
          <div>
            <label htmlFor={`${id}-${option.value}`}>{option.label}</label>
            {option.hint && (
              <p id={`${id}-${option.value}-note`} className="max-w-prose text-note text-ink-2">
                {option.hint}
              </p>
            )}
          </div>
        </div>
      ))}
    </div>
  );
}
