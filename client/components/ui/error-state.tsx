import { ApiProblem, OfflineError } from '../../lib/api-client.ts';
import { Button } from './button.tsx';
import { Notice } from './notice.tsx';

type ErrorStateProps = { error: unknown; onRetry?: () => void; what?: string };

function describe(error: unknown, what: string): { title: string; text: string } {
  if (error instanceof OfflineError)
    return { title: 'No connection', text: `${what} could not be fetched: ${error.message}` };
  if (error instanceof ApiProblem && error.status === 429)
    return { title: 'Too many requests', text: 'Wait a minute, then try again.' };
  if (error instanceof ApiProblem) return { title: `${what} could not be shown`, text: error.detail };
  return {
    title: `${what} could not be shown`,
    text: 'Something went wrong on this page. Loading it again often helps.',
  };
}

/** In place of what could not be loaded, with the way out. */
export function ErrorState({ error, onRetry, what = 'This' }: ErrorStateProps) {
  const { title, text } = describe(error, what);
  return (
    <Notice tone="attention" title={title} role="alert">
      <p>{text}</p>
      {onRetry && (
        <Button look="second" onClick={onRetry} className="mt-3">
          Try again
        </Button>
      )}
    </Notice>
  );
}
