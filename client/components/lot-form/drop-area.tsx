import type { ReactNode } from 'react';
import { useDropzone } from 'react-dropzone';
import { Button } from '../ui/button.tsx';
import type { ControlTies } from '../ui/field.tsx';
import { cx } from '../../lib/cx.ts';

type DropAreaProps = {
  ties: ControlTies;
  /** Names the file control for those who do not see the area. */
  label: string;
  buttonText: ReactNode;
  accept: string;
  multiple?: boolean;
  disabled?: boolean;
  onFiles: (files: File[]) => void;
  children?: ReactNode;
};

/** Takes files by drop, by paste and by a plain button. What is wrong with one is said where it is listed. */
export function DropArea({ ties, label, buttonText, accept, onFiles, children, ...rest }: DropAreaProps) {
  const { multiple = false, disabled = false } = rest;
  const zone = useDropzone({
    multiple,
    disabled,
    noClick: true,
    noKeyboard: true,
    onDrop: (files) => onFiles(multiple ? files : files.slice(0, 1)),
  });
  const { id, 'aria-describedby': describedBy, 'aria-invalid': isInvalid } = ties;
  return (
    <div
      {...zone.getRootProps({ role: 'presentation', tabIndex: -1 })}
      className={cx(
        'flex flex-col items-start gap-3 rounded-box border border-dashed p-4 sm:flex-row sm:items-center',
        isInvalid ? 'border-litharge' : 'border-line',
        zone.isDragActive && 'border-verdigris bg-wash',
      )}
    >
      <input {...zone.getInputProps({ accept, 'aria-label': label, tabIndex: -1 })} />
      <Button
        id={id}
        look="second"
        disabled={disabled}
        aria-describedby={describedBy}
        onClick={zone.open}
        className="shrink-0"
      >
        {buttonText}
      </Button>
      <div className="text-note text-ink-2">{zone.isDragActive ? 'Let go to add it.' : children}</div>
    </div>
  );
}
