import { useQuery } from '@tanstack/react-query';
import { PHOTOS_MAX } from '#shared/limits.ts';
import { Button } from '../../../components/ui/button.tsx';
import { Field, FieldError } from '../../../components/ui/field.tsx';
import { Progress } from '../../../components/ui/progress.tsx';
import { ownLotQuery } from '../../../lib/lots.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { usePhotoChanges } from '../hooks/use-photo-changes.ts';
import { usePhotoUploads, type PhotoUpload } from '../hooks/use-photo-uploads.ts';
import { DropArea } from '../../../components/lot-form/drop-area.tsx';
import { FormSection } from '../../../components/lot-form/form-section.tsx';
import { PhotoTile } from './photo-tile.tsx';

/** The photos: taken in one by one, put in order, captioned, removed. They are kept at once, apart from the draft. */
export function PhotoSection() {
  const { code } = useDraftForm();
  const { data: lot } = useQuery(ownLotQuery(code));
  const photos = lot?.photos ?? [];
  const changes = usePhotoChanges(code);
  const { uploads, add, retry, forget } = usePhotoUploads(code, photos.length);
  const move = (from: number, to: number) => {
    const photoIds = photos.map((photo) => photo.id);
    photoIds.splice(to, 0, ...photoIds.splice(from, 1));
    changes.mutate({ act: 'order', photoIds });
  };
  return (
    <FormSection
      id="section-photos"
      title="Photos"
      sub={`Up to ${PHOTOS_MAX}; the first stands in the register. Place and camera are taken out of each file.`}
    >
      <Field id="lot-photos" label="Add photos" optional>
        {(ties) => (
          <DropArea
            ties={ties}
            label="Photos to add"
            buttonText="Choose photos"
            accept="image/jpeg,image/png,image/webp,image/avif"
            multiple
            disabled={photos.length >= PHOTOS_MAX}
            onFiles={add}
          >
            {photos.length >= PHOTOS_MAX
              ? `All ${PHOTOS_MAX} are here.`
              : 'Or drop them here. JPEG, PNG, WebP or AVIF; 15 MB each.'}
          </DropArea>
        )}
      </Field>
      {uploads.length > 0 && (
        <ul aria-label="Photos on their way" className="flex flex-col gap-3">
          {uploads.map((upload) => (
            <UploadLine
              key={upload.id}
              upload={upload}
              onRetry={() => retry(upload)}
              onForget={() => forget(upload)}
            />
          ))}
        </ul>
      )}
      {changes.isError && <FieldError id="lot-photos-change-error">{changes.error.message}</FieldError>}
      {photos.length > 0 && (
        <ol aria-label="Photos of the lot" className="grid grid-cols-1 gap-4 sm:grid-cols-2">
          {photos.map((photo, at) => (
            <PhotoTile
              key={photo.id}
              photo={photo}
              at={at}
              count={photos.length}
              isBusy={changes.isPending}
              onMove={(to) => move(at, to)}
              onRemove={() => changes.mutate({ act: 'remove', photoId: photo.id })}
              onCaption={(caption) => changes.mutate({ act: 'caption', photoId: photo.id, caption })}
            />
          ))}
        </ol>
      )}
    </FormSection>
  );
}

type UploadLineProps = { upload: PhotoUpload; onRetry: () => void; onForget: () => void };

function UploadLine({ upload, onRetry, onForget }: UploadLineProps) {
  const { file, preview, share, refusal, canRetry } = upload;
  return (
    <li className="flex gap-4">
      <img
        src={preview}
        alt=""
        onError={(event) => (event.currentTarget.hidden = true)}
        className="size-14 shrink-0 rounded-box border border-rule bg-sheet object-cover"
      />
      <div className="min-w-0 grow">
        {refusal === null ? (
          <Progress label={share < 1 ? file.name : `${file.name}: being prepared`} share={share} />
        ) : (
          <>
            <FieldError id={`refusal-${upload.id}`}>
              <span role="alert">
                {file.name}: {refusal}
              </span>
            </FieldError>
            <div className="flex flex-wrap gap-x-3">
              {canRetry && (
                <Button look="quiet" className="min-h-8 py-1" onClick={onRetry}>
                  Send {file.name} again
                </Button>
              )}
              <Button look="quiet" className="min-h-8 py-1" onClick={onForget}>
                Leave {file.name} out
              </Button>
            </div>
          </>
        )}
      </div>
    </li>
  );
}
