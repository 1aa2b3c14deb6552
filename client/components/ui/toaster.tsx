import { useSyncExternalStore } from 'react';
import { currentToasts, dismissToast, onToastsChange } from './toast-store.ts';

/** The live region is always in the page, or the first confirmation would not be read out. */
export function Toaster() {
  const toasts = useSyncExternalStore(onToastsChange, currentToasts);
  return (
    <div
      role="status"
      className="no-print pointer-events-none fixed inset-x-4 bottom-4 z-40 flex flex-col items-end gap-2"
    >
      {toasts.map((toast) => (
        <div
          key={toast.id}
          className="pointer-events-auto flex items-center gap-3 rounded-box bg-ink py-1 pl-4 pr-1 text-paper shadow-float"
        >
          {toast.text}
          <button
            type="button"
            aria-label="Dismiss"
            onClick={() => dismissToast(toast.id)}
            className="grid size-8 place-items-center outline-offset-[-4px]"
          >
            <svg
              viewBox="0 0 10 10"
              className="size-3"
              stroke="currentColor"
              strokeWidth="1.5"
              aria-hidden="true"
            >
              <path d="m1 1 8 8M9 1 1 9" />
            </svg>
          </button>
        </div>
      ))}
    </div>
  );
}
