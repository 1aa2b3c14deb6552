import { useEffect, useRef } from 'react';
import type { LotAnswer, LotDraft } from '#shared/schemas/lots.ts';
import { Button } from '../../../components/ui/button.tsx';

type ConflictPanelProps = {
  mine: LotDraft;
  theirs: LotAnswer;
  onKeepMine: () => void;
  onTakeTheirs: (draft: LotDraft, version: number) => void;
};

const partNames: Record<keyof LotDraft, string> = {
  form: 'form',
  title: 'title',
  description: 'description',
  gross: 'gross mass',
  readability: 'readability',
  contents: 'assay',
  pricing: 'how it is priced',
  price: 'price',
  linkedPercent: 'share of melt',
  floorPercent: 'floor',
  shipping: 'insured parcel',
  destinations: 'destinations',
  closesOn: 'last day',
  certificate: 'certificate',
  confirmsCautions: 'cautions',
  confirmsTitle: 'title to the metal',
};

function differences(mine: LotDraft, theirs: LotDraft): string[] {
  return (Object.keys(partNames) as (keyof LotDraft)[])
    .filter((part) => JSON.stringify(mine[part]) !== JSON.stringify(theirs[part]))
    .map((part) => partNames[part]);
}

/** The draft was saved elsewhere since it was read: both versions are still there, and the member chooses. */
export function ConflictPanel({ mine, theirs, onKeepMine, onTakeTheirs }: ConflictPanelProps) {
  const box = useRef<HTMLElement>(null);
  useEffect(() => box.current?.focus(), []);
  const { draft } = theirs;
  const parts = draft ? differences(mine, draft) : [];
  return (
    <section
      ref={box}
      tabIndex={-1}
      role="alert"
      aria-labelledby="conflict-title"
      className="mb-6 rounded-box border-2 border-litharge bg-sheet p-4"
    >
      <h2 id="conflict-title" className="text-lead font-semibold">
        This draft was changed elsewhere in the meantime
      </h2>
      <p className="mt-1 max-w-prose">
        Another window or device saved it after you opened it here. Nothing is lost: what you typed stands
        below, what was saved there stands on the server.
        {parts.length > 0 && ` They differ in: ${parts.join(', ')}.`}
      </p>
      {draft && theirs.can.edit ? (
        <div className="mt-3 flex flex-wrap gap-3">
          <Button onClick={onKeepMine}>Keep mine: save what stands here over it</Button>
          <Button look="second" onClick={() => onTakeTheirs(draft, theirs.version)}>
            Take theirs: show what was saved there
          </Button>
        </div>
      ) : (
        <p className="mt-2 max-w-prose">
          It has been handed to the desk there, so that it cannot be changed any more. Copy from here what you
          still need, then load the page again.
        </p>
      )}
    </section>
  );
}
