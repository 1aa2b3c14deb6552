import { Button } from '../../../components/ui/button.tsx';
import { Time } from '../../../components/ui/time.tsx';
import type { SaveState } from '../hooks/use-draft-saving.ts';

type SaveLineProps = { state: SaveState; onSave: () => void };

function SaveWords({ state }: { state: SaveState }) {
  if (state.kind === 'saving') return 'saving…';
  if (state.kind === 'changed') return 'not saved yet; saves by itself when you pause';
  if (state.kind === 'failed') return <strong className="text-litharge">not saved: {state.message}</strong>;
  if (state.kind === 'conflict')
    return <strong className="text-litharge">not saved: changed elsewhere</strong>;
  if (state.at === null) return 'all saved';
  return (
    <>
      saved <Time at={state.at} show="clock" />
    </>
  );
}

/** How the draft stands, and the button that saves it now. */
export function SaveLine({ state, onSave }: SaveLineProps) {
  return (
    <div className="contents sm:flex sm:flex-wrap sm:items-center sm:gap-x-4 sm:gap-y-1">
      <Button
        look="second"
        className="max-sm:min-h-9 max-sm:px-2 max-sm:py-1 max-sm:text-note"
        disabled={state.kind === 'conflict'}
        busy={state.kind === 'saving'}
        onClick={onSave}
      >
        Save the draft
      </Button>
      <span role="status" className="text-note text-ink-2 max-sm:w-full">
        <SaveWords state={state} />
      </span>
    </div>
  );
}
