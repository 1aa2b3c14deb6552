import { DOCUMENT_BYTES_MAX } from '#shared/limits.ts';
import { Field } from '../../../components/ui/field.tsx';
import { Progress } from '../../../components/ui/progress.tsx';
import { useUpload } from '../../../lib/use-upload.ts';
import { uploadCertificate } from '../api/upload-certificate.ts';
import { fieldIdOf } from '../../../components/lot-form/field-ids.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { DropArea } from '../../../components/lot-form/drop-area.tsx';

const TOO_LARGE = `The document is too large: at most ${DOCUMENT_BYTES_MAX / (1024 * 1024)} MB.`;
const pointer = '/certificate/fileId';

/** The document is sent at once; the one that is there stays until the new one has arrived. */
export function CertificateFile() {
  const { code, draft, change, errorAt } = useDraftForm();
  const { sending, refusal, take } = useUpload({
    send: (file, progress) => uploadCertificate(code, file, progress),
    bytesMax: DOCUMENT_BYTES_MAX,
    tooLarge: TOO_LARGE,
    onTaken: (taken) =>
      change((before) => {
        const { fileId, fileName } = taken;
        return { ...before, certificate: { ...before.certificate, fileId, fileName } };
      }),
  });
  const { fileId, fileName } = draft.certificate;
  return (
    <Field id={fieldIdOf(pointer)} label="Document" error={refusal ?? errorAt(pointer)}>
      {(ties) => (
        <>
          <DropArea
            ties={ties}
            label="Certificate document"
            buttonText={fileId === null ? 'Choose the document' : 'Put another in its place'}
            accept="application/pdf,image/jpeg,image/png"
            disabled={sending !== null}
            onFiles={([file]) => file && void take(file)}
          >
            {fileId === null ? (
              'Or drop it here. PDF, JPEG or PNG; 10 MB at most.'
            ) : (
              <>
                <span className="font-medium text-ink">{fileName}</span> is here.
              </>
            )}
          </DropArea>
          {sending && <Progress label={sending.name} share={sending.share} />}
        </>
      )}
    </Field>
  );
}
