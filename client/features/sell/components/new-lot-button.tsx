import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { Button, type ButtonLook } from '../../../components/ui/button.tsx';
import { FieldError } from '../../../components/ui/field.tsx';
import { myLotsQuery, ownLotQuery } from '../../../lib/lots.ts';
import { paths } from '../../../lib/paths.ts';
import { createDraft } from '../api/create-draft.ts';

type NewLotButtonProps = { copyOf?: string; look?: ButtonLook };

/** Makes a draft, blank or as a copy, and goes there. */
export function NewLotButton({ copyOf, look = 'main' }: NewLotButtonProps) {
  const client = useQueryClient();
  const navigate = useNavigate();
  const creation = useMutation({
    mutationFn: () => createDraft(copyOf),
    onSuccess: async (lot) => {
      client.setQueryData(ownLotQuery(lot.code).queryKey, lot);
      await navigate(paths.draft(lot.code));
      await client.invalidateQueries({ queryKey: myLotsQuery.queryKey });
    },
  });
  return (
    <span className="inline-flex flex-col items-start gap-1">
      <Button look={look} busy={creation.isPending} onClick={() => creation.mutate()}>
        {copyOf ? 'Copy to a new draft' : 'Describe a new lot'}
      </Button>
      {creation.isError && (
        <span role="alert">
          <FieldError id="new-lot-error">{creation.error.message}</FieldError>
        </span>
      )}
    </span>
  );
}
