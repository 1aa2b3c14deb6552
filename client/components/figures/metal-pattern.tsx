import { useId } from 'react';
import type { Metal } from '#shared/metals.ts';

type MetalPatternProps = { id: string; metal: Metal };

const line = { stroke: 'currentColor', strokeWidth: 0.8, strokeOpacity: 0.7 };

/** The fill that stands for a metal, beside its symbol: slant, level, crossed, dotted. */
export function MetalPattern({ id, metal }: MetalPatternProps) {
  if (metal === 'Pd') {
    return (
      <pattern id={id} width="5" height="5" patternUnits="userSpaceOnUse">
        <circle cx="1.3" cy="1.3" r="0.8" fill="currentColor" fillOpacity="0.75" />
        <circle cx="3.8" cy="3.8" r="0.8" fill="currentColor" fillOpacity="0.75" />
      </pattern>
    );
  }
  const turn = metal === 'Au' ? 'rotate(38)' : metal === 'Pt' ? 'rotate(45)' : undefined;
  return (
    <pattern id={id} width="4.6" height="4.6" patternUnits="userSpaceOnUse" patternTransform={turn}>
      {metal !== 'Ag' && <line x1="0" y1="0" x2="0" y2="4.6" {...line} />}
      {metal !== 'Au' && <line x1="0" y1="0" x2="4.6" y2="0" {...line} />}
    </pattern>
  );
}

export function MetalSwatch({ metal }: { metal: Metal }) {
  const id = useId();
  return (
    <svg viewBox="0 0 24 24" className="size-6" aria-hidden="true">
      <MetalPattern id={id} metal={metal} />
      <rect x="1" y="1" width="22" height="22" rx="2" fill={`url(#${id})`} stroke="currentColor" />
    </svg>
  );
}
