import { useState } from 'react';
import type { CaseAnswer } from '#shared/schemas/desk.ts';
import { Button } from '../../../components/ui/button.tsx';

const ZOOM_STEPS = [100, 150, 200, 300, 400] as const;

function ZoomedImage({ url, name }: { url: string; name: string }) {
  const [step, setStep] = useState(0);
  const percent = ZOOM_STEPS[step] ?? 100;
  return (
    <>
      <div className="flex flex-wrap items-center gap-3 border-b border-rule px-3 py-2">
        <Button look="second" disabled={step === 0} onClick={() => setStep(step - 1)}>
          Smaller
        </Button>
        <Button look="second" disabled={step === ZOOM_STEPS.length - 1} onClick={() => setStep(step + 1)}>
          Larger
        </Button>
        <span role="status" className="fig">
          {percent} %
        </span>
      </div>
      <div
        role="region"
        aria-label="Document, scrolls"
        // A region that scrolls must be reachable by keyboard.
        tabIndex={0}
        className="h-[70vh] overflow-auto"
      >
        <img
          src={url}
          alt={`The report as uploaded: ${name}`}
          className="max-w-none"
          style={{ width: `${percent}%` }}
        />
      </div>
    </>
  );
}

/** The report as it was uploaded, in the page. */
export function DocumentView({ document }: { document: CaseAnswer['document'] }) {
  const { url, mediaType, name } = document;
  return (
    <section aria-labelledby="document-heading">
      <div className="mb-2 flex flex-wrap items-baseline justify-between gap-x-4">
        <h2 id="document-heading">Document</h2>
        <a href={url} target="_blank" rel="noreferrer" className="link inline-block py-1 text-note">
          Open {name} in a tab of its own
        </a>
      </div>
      <div className="sheet overflow-hidden">
        {mediaType === 'application/pdf' ? (
          <iframe
            src={url}
            title={`The report as uploaded: ${name}`}
            className="block h-[75vh] w-full bg-paper"
          />
        ) : (
          <ZoomedImage url={url} name={name} />
        )}
      </div>
    </section>
  );
}
