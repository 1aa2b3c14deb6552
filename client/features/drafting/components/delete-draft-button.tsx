import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { Button } from '../../../components/ui/button.tsx';
import { ConfirmPanel } from '../../../components/ui/confirm-panel.tsx';
import { myLotsQuery, ownLotQuery } from '../../../lib/lots.ts';
import { paths } from '../../../lib/paths.ts';
import { deleteDraft } from '../api/delete-draft.ts';

type DeleteDraftButtonProps = { code: string; onDeleted: () => void };

/** Throws a draft away that the desk has never seen. */
export function DeleteDraftButton({ code, onDeleted }: DeleteDraftButtonProps) {
  const [isAsking, setIsAsking] = useState(false);
  const client = useQueryClient();
  const navigate = useNavigate();
  const removal = useMutation({
    mutationFn: () => deleteDraft(code),
    onSuccess: async () => {
      onDeleted();
      await navigate(paths.sell());
      client.removeQueries({ queryKey: ownLotQuery(code).queryKey });
      await client.invalidateQueries({ queryKey: myLotsQuery.queryKey });
    },
  });
  if (!isAsking)
    return (
      <Button look="quiet" onClick={() => setIsAsking(true)}>
        Throw this draft away
      </Button>
    );
  return (
    <ConfirmPanel
      title="Throw this draft away?"
      sum={null}
      counterparty="nobody: only you have seen it"
      consequence="What was typed, its photos and its document are removed for good."
      confirmText="Throw the draft away"
      danger
      busy={removal.isPending}
      problem={removal.error?.message}
      onConfirm={() => removal.mutate()}
      onCancel={() => setIsAsking(false)}
    />
  );
}
