import { useMutation } from '@tanstack/react-query';
import type { CaseAnswer } from '#shared/schemas/desk.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Notice } from '../../../components/ui/notice.tsx';
import { sendCaseAct } from '../api/certificates.ts';
import { useCaseRefresh, useCaseReload } from '../hooks/use-case-refresh.ts';

/** Who holds the case, and taking or giving it back. A refusal stands here, with the case as it now is. */
export function ClaimPanel({ view }: { view: CaseAnswer }) {
  const refresh = useCaseRefresh();
  const reload = useCaseReload(view.id);
  const act = useMutation({
    mutationFn: (name: 'claim' | 'release') => sendCaseAct(view.id, name),
    onSuccess: (answer, name) =>
      refresh(answer, name === 'claim' ? 'The case is yours.' : 'The case is free again.'),
    onError: reload,
  });
  return (
    <div className="flex flex-col items-start gap-3">
      {view.state === 'claimed' && (
        <p>
          {view.can.verify ? 'You hold this case.' : `${view.claimedBy ?? 'A colleague'} holds this case.`}
        </p>
      )}
      {act.isError && (
        <Notice tone="attention" role="alert" title="Nothing was changed">
          {act.error.message}
        </Notice>
      )}
      {view.can.claim && (
        <Button busy={act.isPending} onClick={() => act.mutate('claim')}>
          Claim this case
        </Button>
      )}
      {view.can.release && (
        <Button look="second" busy={act.isPending} onClick={() => act.mutate('release')}>
          Give the case back
        </Button>
      )}
    </div>
  );
}
