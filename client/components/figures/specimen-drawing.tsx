import { useId, type ReactNode } from 'react';
import { METAL_NAMES, type Metal } from '#shared/metals.ts';
import { formName, type LotForm } from './lot-words.tsx';
import { MetalPattern } from './metal-pattern.tsx';
import { specimenShapes } from './specimen-shapes.tsx';

type SpecimenDrawingProps = {
  form: LotForm;
  metal?: Metal;
  /** Left out where the form stands written beside it. */
  label?: string | null;
  className?: string;
};

/** A lot of this form, in line work; the metal is told by its symbol and its hatching. */
export function SpecimenDrawing({ form, metal = 'Au', label, className }: SpecimenDrawingProps) {
  const id = useId();
  const Shape = specimenShapes[form];
  const name =
    label === undefined ? `Drawing: ${formName(form)}, ${METAL_NAMES[metal].toLowerCase()}` : label;
  return (
    <Frame name={name} className={className}>
      <MetalPattern id={id} metal={metal} />
      <Shape hatch={`url(#${id})`} />
      <text
        x="116"
        y="86"
        textAnchor="end"
        className="font-sans text-[9px] font-semibold"
        fill="currentColor"
        stroke="none"
      >
        {metal}
      </text>
    </Frame>
  );
}

type FrameProps = { name: string | null; className: string | undefined; children: ReactNode };

function Frame({ name, className, children }: FrameProps) {
  return (
    <svg
      viewBox="0 0 120 90"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.1"
      strokeLinejoin="round"
      strokeLinecap="round"
      className={className}
      {...(name === null ? { 'aria-hidden': true } : { role: 'img', 'aria-label': name })}
    >
      {children}
    </svg>
  );
}
