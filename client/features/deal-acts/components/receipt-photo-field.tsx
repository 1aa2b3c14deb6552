import { DropArea } from '../../../components/lot-form/drop-area.tsx';
import { Button } from '../../../components/ui/button.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Progress } from '../../../components/ui/progress.tsx';
import type { useReceiptPhoto } from '../hooks/use-receipt-photo.ts';

type ReceiptPhotoFieldProps = {
  id: string;
  photo: ReturnType<typeof useReceiptPhoto>;
  error: string | undefined;
};

/** One photo of the metal on the balance, where the buyer has one. */
export function ReceiptPhotoField({ id, photo, error }: ReceiptPhotoFieldProps) {
  const { sending, refusal, taken, take, drop } = photo;
  return (
    <Field
      id={id}
      label="Photo of the weighing"
      optional
      hint="The metal on the balance with its display. Seller and desk see it; place and camera are taken out."
      error={refusal ?? error}
    >
      {(ties) => (
        <>
          <DropArea
            ties={ties}
            label="Photo of the weighing"
            buttonText={taken === null ? 'Choose a photo' : 'Take another'}
            accept="image/jpeg,image/png,image/webp,image/avif"
            disabled={sending !== null}
            onFiles={([file]) => file && void take(file)}
          >
            {taken === null ? (
              'Or drop it here. JPEG, PNG, WebP or AVIF; 15 MB at most.'
            ) : (
              <span className="flex flex-wrap items-center gap-3">
                <img
                  src={taken.preview}
                  alt=""
                  onError={(event) => (event.currentTarget.hidden = true)}
                  className="size-14 rounded-box border border-rule bg-sheet object-cover"
                />
                <span className="font-medium text-ink">{taken.name}</span>
                <Button look="quiet" className="min-h-8 py-1" onClick={drop}>
                  Leave it out
                </Button>
              </span>
            )}
          </DropArea>
          {sending && (
            <Progress
              label={sending.share < 1 ? sending.name : `${sending.name}: being prepared`}
              share={sending.share}
            />
          )}
        </>
      )}
    </Field>
  );
}
