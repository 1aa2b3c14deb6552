import { useEffect, useRef } from 'react';

export type SummaryItem = { fieldId: string | null; message: string };

type ErrorSummaryProps = {
  items: SummaryItem[];
  /** Change it at every failed try: the summary then takes the focus again, even when the errors are the same. */
  attempt?: number;
  title?: string;
};

function goToField(event: { preventDefault: () => void }, fieldId: string) {
  const field = document.getElementById(fieldId);
  if (!field) return;
  event.preventDefault();
  // The label must be in view too, or one does not see what is asked.
  const label = document.querySelector(`label[for="${CSS.escape(fieldId)}"]`);
  (label ?? field).scrollIntoView?.({ block: 'start' });
  field.focus({ preventScroll: true });
}

/** Stands at the top of a form that was refused, takes the focus, and leads to each field. */
export function ErrorSummary({ items, attempt = 0, title }: ErrorSummaryProps) {
  const box = useRef<HTMLDivElement>(null);
  const hasErrors = items.length > 0;
  useErrorTitle(hasErrors);
  useEffect(() => {
    if (hasErrors) box.current?.focus();
  }, [hasErrors, attempt]);
  if (!hasErrors) return null;
  const heading =
    title ??
    (items.length === 1 ? 'One thing needs another look' : `${items.length} things need another look`);
  return (
    <div ref={box} tabIndex={-1} className="mb-6 rounded-box border-2 border-litharge bg-sheet p-4">
      <div role="alert">
        <h2 className="text-lead font-semibold">{heading}</h2>
        <ul className="mt-2 flex flex-col gap-1">
          {items.map((item) => (
            <li key={`${item.fieldId}:${item.message}`}>
              {item.fieldId === null ? (
                item.message
              ) : (
                <a
                  href={`#${item.fieldId}`}
                  onClick={(event) => goToField(event, item.fieldId ?? '')}
                  className="block py-0.5 font-medium text-litharge underline"
                >
                  {item.message}
                </a>
              )}
            </li>
          ))}
        </ul>
      </div>
    </div>
  );
}

const PREFIX = 'Error: ';

/** While a form stands refused the title of the page says so, for who returns to the tab or hears it read. */
export function useErrorTitle(hasErrors: boolean): void {
  useEffect(() => {
    if (!hasErrors) return;
    const title = document.title;
    if (!title.startsWith(PREFIX)) document.title = PREFIX + title;
    return () => {
      if (document.title.startsWith(PREFIX)) document.title = document.title.slice(PREFIX.length);
    };
  }, [hasErrors]);
}
