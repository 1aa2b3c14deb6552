import { useEffect, useId, useRef, type ReactNode } from 'react';
import { Button } from './button.tsx';

type DialogProps = {
  open: boolean;
  onClose: () => void;
  title: ReactNode;
  children: ReactNode;
  wide?: boolean;
};

/**
 * The browser's own modal dialog: it holds the focus, gives it back, and closes by Escape. Dialog libraries write a
 * style element to lock scrolling, which the content security policy forbids.
 */
export function Dialog({ open, onClose, title, children, wide = false }: DialogProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const element = dialog.current;
    if (!element) return;
    if (open && !element.open) element.showModal();
    if (!open && element.open) element.close();
  }, [open]);
  return (
    <dialog
      ref={dialog}
      aria-labelledby={titleId}
      onClose={onClose}
      onClick={(event) => event.target === dialog.current && dialog.current.close()}
      className={`m-auto w-[calc(100%-2rem)] rounded-box border border-line bg-sheet p-0 text-ink shadow-float ${wide ? 'max-w-5xl' : 'max-w-xl'}`}
    >
      {open && (
        <div className="p-5 sm:p-6">
          <div className="mb-4 flex items-start justify-between gap-4">
            <h2 id={titleId}>{title}</h2>
            <Button look="quiet" onClick={onClose} className="-mr-2 -mt-2 shrink-0">
              Close
            </Button>
          </div>
          {children}
        </div>
      )}
    </dialog>
  );
}
