import type { ReactNode } from 'react';

type FormSectionProps = { id: string; title: string; sub?: ReactNode; children: ReactNode };

/** One part of the lot form, under a rule. */
export function FormSection({ id, title, sub, children }: FormSectionProps) {
  return (
    <section aria-labelledby={id} className="border-t border-rule pb-10 pt-6">
      <h2 id={id}>{title}</h2>
      {sub && <p className="mt-1 max-w-prose text-ink-2">{sub}</p>}
      <div className="mt-5 flex flex-col gap-6">{children}</div>
    </section>
  );
}
